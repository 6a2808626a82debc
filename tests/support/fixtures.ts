import { once } from 'node:events';
import { eq, sql } from 'drizzle-orm';
import pg from 'pg';
import { from as copyFrom } from 'pg-copy-streams';
import { inTransaction, type Tx } from '../../db/client';
import { alias, object } from '../../db/schema/object';
import { catalogue, catalogueRevision, storedFile } from '../../db/schema/catalogue';
import { job } from '../../db/schema/job';
import { researchGroup } from '../../db/schema/group';
import type { GroupActor } from '../../server/context';
import { coveragePicture } from '../../server/services/coverage';
import { runJob } from '../../server/services/jobs';
import { JOB_KIND_WORK } from '../../server/jobs/kinds';
import { nameKey } from '../../shared/astro/designations';
import type { ColumnMapping } from '../../shared/schemas/mapping';
import type { World } from './world';

export interface FixtureSource {
  raDeg: number;
  decDeg: number;
  errArcsec?: number;
  designation?: string;
  /** Further cells behind name, ra, dec, err. */
  cells?: string[];
}

export interface FixtureCatalogue {
  label: string;
  catalogueId: number;
  revisionId: number;
  entryIds: number[];
  numbers: number[];
}

/** Puts a catalogue straight into the database, as a finished import would leave it. */
export async function addCatalogue(
  world: World,
  input: { label: string; sources: FixtureSource[]; columns?: string[]; mapping?: Partial<ColumnMapping>; actor?: GroupActor },
): Promise<FixtureCatalogue> {
  const actor = input.actor ?? world.actors.owner;
  return inTransaction(world.context.database, actor, async (tx) => {
    const { catalogueId, revisionId } = await insertRevision(tx, actor, input);
    const first = await tx.execute<{ first: number }>(
      sql`select reserve_entry_ids(${Math.max(1, input.sources.length)}) as first`,
    );
    const firstId = Number(first.rows[0]?.first);
    const entryIds = input.sources.map((_, i) => firstId + i);
    await copySources(tx, actor, input, revisionId, entryIds);
    const numbers = await register(tx, actor, input, catalogueId, entryIds);
    return { label: input.label, catalogueId, revisionId, entryIds, numbers };
  });
}

const FIXTURE_COLUMNS = ['name', 'ra', 'dec', 'err'];

async function insertRevision(
  tx: Tx,
  actor: GroupActor,
  input: { label: string; sources: FixtureSource[]; columns?: string[]; mapping?: Partial<ColumnMapping> },
) {
  const fileId = crypto.randomUUID();
  const jobId = crypto.randomUUID();
  const dialect = {
    compression: 'none',
    encoding: 'utf-8',
    delimiter: ',',
    quoted: false,
    header: true,
    commentPrefix: null,
    decimalComma: false,
  } as const;
  const columns = [...FIXTURE_COLUMNS, ...(input.columns ?? [])].map((name, i) => ({
    name,
    kind: i === 0 ? ('text' as const) : ('number' as const),
  }));
  await tx.insert(storedFile).values({
    id: fileId,
    groupId: actor.groupId,
    name: `${input.label}.csv`,
    sizeBytes: 0,
    sha256: '',
    uploadedBy: actor.personId,
    inspection: {
      dialect,
      columns: columns.map((column) => ({ ...column, examples: [] })),
      rowsSeen: input.sources.length,
      wholeFileSeen: true,
      suggestedMapping: null,
      sample: [],
    },
  });
  await tx.insert(job).values({
    id: jobId,
    groupId: actor.groupId,
    kind: 'import',
    title: `Import of ${input.label}`,
    state: 'done',
    payload: {},
    createdBy: actor.personId,
    finishedAt: new Date(),
  });
  const [row] = await tx
    .insert(catalogue)
    .values({
      groupId: actor.groupId,
      label: input.label,
      title: `Catalogue ${input.label}`,
      ordinal: await tx.$count(catalogue, eq(catalogue.groupId, actor.groupId)),
      createdBy: actor.personId,
    })
    .returning();
  const catalogueId = row?.id ?? 0;
  const [revision] = await tx
    .insert(catalogueRevision)
    .values({
      groupId: actor.groupId,
      catalogueId,
      number: 1,
      fileId,
      jobId,
      dialect,
      mapping: {
        position: { kind: 'two-columns', raColumn: 1, decColumn: 2, raNotation: 'degrees', decNotation: 'degrees' },
        keyColumn: 0,
        names: [{ column: 0, separator: null }],
        error: { kind: 'circle', column: 3, unit: 'arcsec', meaning: 'sigma' },
        properMotion: null,
        photometry: [],
        redshift: null,
        ...input.mapping,
      },
      columns,
      frame: 'ICRS',
      state: 'ready',
      coverage: coveragePicture(
        Float64Array.from(input.sources, (source) => source.raDeg),
        Float64Array.from(input.sources, (source) => source.decDeg),
      ),
      rowsRead: input.sources.length,
      sources: input.sources.length,
      registeredAt: new Date(),
      createdBy: actor.personId,
    })
    .returning();
  return { catalogueId, revisionId: revision?.id ?? 0 };
}

const designationOf = (label: string, source: FixtureSource, i: number) => source.designation ?? `${label} ${i + 1}`;

async function copySources(
  tx: Tx,
  actor: GroupActor,
  input: { label: string; sources: FixtureSource[] },
  revisionId: number,
  entryIds: number[],
) {
  const opened = await tx.execute<{ part: string }>(sql`select open_partition('source', ${revisionId}) as part`);
  const stream = tx.$client.query(copyFrom(`copy ${opened.rows[0]?.part ?? ''} (group_id, revision_id, row_no, entry_id, key,
    designation, ra_deg, dec_deg, err_maj_arcsec, err_min_arcsec, err_pa_deg, cells) from stdin`));
  input.sources.forEach((source, i) => {
    const name = designationOf(input.label, source, i);
    const err = source.errArcsec ?? '\\N';
    const cells = [name, source.raDeg, source.decDeg, source.errArcsec ?? '', ...(source.cells ?? [])].join('\u001f');
    stream.write(
      [actor.groupId, revisionId, i + 1, entryIds[i], name, name, source.raDeg, source.decDeg, err, err, 0, cells].join('\t') +
        '\n',
    );
  });
  stream.end();
  await once(stream, 'finish');
  await tx.execute(sql`select attach_partition('source', ${revisionId})`);
}

async function register(
  tx: Tx,
  actor: GroupActor,
  input: { label: string; sources: FixtureSource[] },
  catalogueId: number,
  entryIds: number[],
): Promise<number[]> {
  if (input.sources.length === 0) return [];
  const count = input.sources.length;
  const [after] = await tx
    .update(researchGroup)
    .set({ nextObjectNumber: sql`${researchGroup.nextObjectNumber} + ${count}` })
    .where(eq(researchGroup.id, actor.groupId))
    .returning({ next: researchGroup.nextObjectNumber });
  const base = (after?.next ?? count) - count;
  const rows = input.sources.map((source, i) => ({
    id: entryIds[i] ?? 0,
    groupId: actor.groupId,
    number: base + i,
    name: designationOf(input.label, source, i),
    source,
  }));
  const opened = await tx.execute<{ part: string }>(sql`select open_partition('entry', ${catalogueId}) as part`);
  await tx.execute(sql`insert into ${sql.raw(opened.rows[0]?.part ?? '')} (id, group_id, catalogue_id, key)
    select id, ${actor.groupId}::int, ${catalogueId}::int, key
    from unnest(${sql.param(entryIds)}::bigint[], ${sql.param(rows.map((row) => row.name))}::text[]) as e (id, key)`);
  await tx.execute(sql`select attach_partition('entry', ${catalogueId})`);
  await tx.insert(object).values(
    rows.map(({ source, ...row }) => ({
      ...row,
      raDeg: source.raDeg,
      decDeg: source.decDeg,
      errArcsec: source.errArcsec ?? null,
    })),
  );
  await tx.insert(alias).values(
    rows.map((row) => ({
      groupId: row.groupId,
      objectId: row.id,
      name: row.name,
      key: nameKey(row.name),
      origin: 'entry' as const,
    })),
  );
  return rows.map((row) => row.number);
}

/** Carries out every queued job of the world's group in this process, in order of birth. */
export async function runJobs(world: World): Promise<void> {
  const groupId = world.actors.owner.groupId;
  for (;;) {
    const rows = await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.select({ id: job.id }).from(job).where(eq(job.state, 'queued')).orderBy(job.createdAt, job.id).limit(1),
    );
    const next = rows[0];
    if (next === undefined) return;
    await runJob(world.context, { jobId: next.id, groupId }, JOB_KIND_WORK);
  }
}

/** A connection as the database's owner, past row-level policies only where it is a superuser. */
export async function withOwner<T>(world: World, work: (client: pg.Client) => Promise<T>): Promise<T> {
  const client = new pg.Client({ connectionString: world.ownerUrl });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}
