import { gzipSync } from 'node:zlib';
import type { CatalogueDetail, NewCatalogue } from '../../shared/schemas/catalogue';
import type { UploadedFile } from '../../shared/schemas/file';
import type { Job } from '../../shared/schemas/job';
import { runJobs } from './fixtures';
import type { Agent, World } from './world';

/** Uploads bytes as a person's file; answers the raw response. */
export function upload(world: World, bytes: Buffer | string, name = 'table.csv', agent: Agent = world.agents.curator) {
  const body = typeof bytes === 'string' ? Buffer.from(bytes) : bytes;
  return agent.post(world.api('files')).attach('file', body, { filename: name });
}

export const gzip = (text: string | Buffer) => gzipSync(text);

/** Uploads a table, takes the suggested mapping (with changes), and carries out the import. */
export async function importTable(
  world: World,
  label: string,
  bytes: Buffer | string,
  change: Partial<NewCatalogue> = {},
): Promise<{ job: Job; catalogue: CatalogueDetail | null }> {
  const answer = await upload(world, bytes, `${label}.csv`);
  if (answer.status !== 201) throw new Error(`upload answered ${answer.status}: ${JSON.stringify(answer.body)}`);
  const jobId = await startImport(world, label, answer.body as UploadedFile, change);
  await runJobs(world);
  const job = (await world.agents.reader.get(world.api(`jobs/${jobId}`))).body as Job;
  const detail = await world.agents.reader.get(world.api(`catalogues/${label}`));
  return { job, catalogue: detail.status === 200 ? (detail.body as CatalogueDetail) : null };
}

/** Makes the catalogue; its import waits in the queue. */
export async function startImport(
  world: World,
  label: string,
  file: UploadedFile,
  change: Partial<NewCatalogue> = {},
): Promise<string> {
  const answer = await world.agents.curator.post(world.api('catalogues'), {
    label,
    title: `Catalogue ${label}`,
    description: '',
    band: 'optical',
    citation: '',
    fileId: file.fileId,
    dialect: file.inspection.dialect,
    mapping: file.inspection.suggestedMapping,
    frame: 'ICRS',
    epochYear: null,
    ...change,
  });
  if (answer.status !== 202) throw new Error(`catalogue answered ${answer.status}: ${JSON.stringify(answer.body)}`);
  return (answer.body as { jobId: string }).jobId;
}
