import { setTimeout as sleep } from 'node:timers/promises';
import type { UploadedFile } from '../shared/schemas/file';
import type { Job } from '../shared/schemas/job';
import type { ObjectSummary } from '../shared/schemas/object';
import type { SessionState } from '../shared/schemas/session';
import { generateScenario, type ScenarioFile } from './generate';
import { DEMO_GROUP, DEMO_MEMBERS, DEMO_OWNER, type DemoPerson } from './people';
import { BANDS, CATALOGUES, NOTES } from './scenario';

export interface DemoSignIn {
  role: string;
  email: string;
  password: string;
}

const POLL_MS = 100;
const RUNS = [
  { catalogues: ['WICK', 'COAL'], radiusArcsec: 2, title: 'Optical and near-infrared' },
  { catalogues: ['WICK', 'HUM', 'FLINT'], radiusArcsec: 5, title: 'Optical, radio and X-ray' },
];
const POLICIES = [
  { run: 1, rule: { maxSepArcsec: 1.2, mutualBest: true, noRival: true, grade: 'probable' } },
  { run: 2, rule: { maxSepArcsec: 2.5, mutualBest: true, noRival: true, grade: 'possible' } },
];

/**
 * Fills an empty installation with the demo, through the API of the running server and as its people would: account,
 * members, four uploads and imports, two cross-matches, a policy for each, some notes. Does nothing when there is an
 * account already; then `signIns` tells the demo's only if the first account is the demo owner's.
 */
export async function seedDemo(options: { webUrl: string }): Promise<{ seeded: boolean; signIns: DemoSignIn[] }> {
  const nobody = new ApiClient(options.webUrl);
  const { needsSetup } = await nobody.get<SessionState>('/api/session');
  if (!needsSetup) return { seeded: false, signIns: (await nobody.signIn(DEMO_OWNER)) ? signIns() : [] };
  // Made before anything else: it keeps this process busy for seconds, in which open connections would time out.
  const { files } = generateScenario();
  const owner = new ApiClient(options.webUrl);
  await owner.setUp();
  const group = await owner.firstGroup();
  for (const member of DEMO_MEMBERS) await owner.post(`${group}/members`, member);
  const curator = new ApiClient(options.webUrl);
  await curator.signIn(DEMO_MEMBERS[0] ?? DEMO_OWNER);
  for (const file of files) await importFile(curator, group, file);
  await matchAndDecide(curator, group);
  await writeNotes(curator, group);
  return { seeded: true, signIns: signIns() };
}

function signIns(): DemoSignIn[] {
  return [DEMO_OWNER, ...DEMO_MEMBERS].map(({ role, email, password }) => ({ role, email, password }));
}

/** Uploads a file, imports it under its description, and waits until its objects are registered. */
async function importFile(client: ApiClient, group: string, file: ScenarioFile): Promise<void> {
  const { fileName: _fileName, ...description } = CATALOGUES[file.band];
  const form = new FormData();
  form.set('file', new Blob([new Uint8Array(file.bytes)]), file.name);
  const uploaded = await client.send<UploadedFile>('POST', `${group}/files`, form);
  const accepted = await client.post<{ jobId: string }>(`${group}/catalogues`, {
    ...description,
    fileId: uploaded.fileId,
    dialect: uploaded.inspection.dialect,
    frame: 'ICRS',
  });
  await client.finished(group, accepted.jobId);
}

async function matchAndDecide(client: ApiClient, group: string): Promise<void> {
  for (const run of RUNS) {
    const accepted = await client.post<{ jobId: string }>(`${group}/runs`, run);
    await client.finished(group, accepted.jobId);
  }
  for (const { run, rule } of POLICIES) {
    const accepted = await client.post<{ jobId: string }>(`${group}/runs/${run}/policies`, rule);
    await client.finished(group, accepted.jobId);
  }
}

/** Notes on objects that stand in every catalogue, or in as many as any does. */
async function writeNotes(client: ApiClient, group: string): Promise<void> {
  const most = `minEntries=${BANDS.length - 1}&limit=${NOTES.length}&sort=entries&order=desc`;
  const { items } = await client.get<{ items: ObjectSummary[] }>(`${group}/objects?${most}`);
  for (const note of NOTES) {
    const object = items[note.rank];
    if (object !== undefined) await client.post(`${group}/objects/${object.number}/notes`, { body: note.text });
  }
}

/** A client of the API with its own session. */
class ApiClient {
  private readonly url: string;
  private cookie = '';

  constructor(url: string) {
    this.url = url;
  }

  async signIn({ email, password }: DemoPerson): Promise<boolean> {
    const response = await this.fetch('POST', '/api/session', { email, password });
    return response.ok;
  }

  async setUp(): Promise<void> {
    const { name, email, password } = DEMO_OWNER;
    await this.post('/api/setup', { name, email, password, groupName: DEMO_GROUP });
  }

  async firstGroup(): Promise<string> {
    const { memberships } = await this.get<SessionState>('/api/session');
    return `/api/groups/${memberships[0]?.group ?? ''}`;
  }

  get<T>(path: string): Promise<T> {
    return this.send<T>('GET', path);
  }

  post<T>(path: string, body: object): Promise<T> {
    return this.send<T>('POST', path, body);
  }

  async send<T>(method: string, path: string, body?: object): Promise<T> {
    const response = await this.fetch(method, path, body);
    const text = await response.text();
    if (!response.ok) throw new Error(`${method} ${path} answered ${response.status}: ${text}`);
    return (text === '' ? undefined : JSON.parse(text)) as T;
  }

  async finished(group: string, jobId: string): Promise<void> {
    for (;;) {
      const job = await this.get<Job>(`${group}/jobs/${jobId}`);
      if (job.state === 'done') return;
      if (job.finishedAt !== null) throw new Error(`${job.title}: ${job.error?.detail ?? job.state}`);
      await sleep(POLL_MS);
    }
  }

  private async fetch(method: string, path: string, body?: object): Promise<Response> {
    const isForm = body instanceof FormData;
    const response = await fetch(`${this.url}${path}`, {
      method,
      headers: {
        'X-Idem': '1',
        ...(this.cookie === '' ? {} : { Cookie: this.cookie }),
        ...(body === undefined || isForm ? {} : { 'Content-Type': 'application/json' }),
      },
      body: body === undefined ? undefined : isForm ? body : JSON.stringify(body),
    });
    const [cookie] = response.headers.getSetCookie();
    if (cookie !== undefined) this.cookie = cookie.split(';')[0] ?? '';
    return response;
  }
}
