import { mkdtemp, rm } from 'node:fs/promises';
import { createServer, type Server } from 'node:http';
import { tmpdir } from 'node:os';
import path from 'node:path';
import supertest from 'supertest';
import type { Express } from 'express';
import { inTransaction } from '../../db/client';
import { membership } from '../../db/schema/group';
import { person } from '../../db/schema/person';
import { createApp } from '../../server/app';
import { readConfig } from '../../server/config';
import type { Context, GroupActor } from '../../server/context';
import { closeContext, openContext } from '../../server/process';
import { createGroup, groupDetail } from '../../server/services/groups';
import { hashPassword, memberOf, signIn } from '../../server/services/sessions';
import { ROLES, type Role } from '../../shared/words';
import { createTestDatabase } from './database';

const PASSWORD = 'a password for tests';

/** A client of the API that is signed in (or not) and sends the header of changing requests. */
export interface Agent {
  get(path: string): supertest.Test;
  post(path: string, body?: object): supertest.Test;
  patch(path: string, body?: object): supertest.Test;
  delete(path: string): supertest.Test;
  cookie: string | null;
}

export interface World {
  context: Context;
  app: Express;
  /** Slug of the group under test, and of a second group that no member of the first belongs to. */
  group: string;
  foreignGroup: string;
  /** Path below the group: api('objects/1') -> '/api/groups/<slug>/objects/1'. */
  api(below: string): string;
  agents: Record<Role, Agent> & { foreign: Agent; nobody: Agent };
  actors: Record<Role, GroupActor> & { foreign: GroupActor };
  ownerUrl: string;
  close(): Promise<void>;
}

/** A fresh database with two groups, one person for each role in the first and an owner of the second. */
export async function createWorld(env: Record<string, string> = {}): Promise<World> {
  const database = await createTestDatabase();
  const dataDir = await mkdtemp(path.join(tmpdir(), 'idem-world-'));
  const config = readConfig({
    IDEM_APP_DATABASE_URL: database.appUrl,
    IDEM_DATA_DIR: dataDir,
    IDEM_SESSION_SECRET: 'a secret for tests that is long enough',
    IDEM_LOG_LEVEL: process.env.IDEM_LOG_LEVEL ?? 'silent',
    IDEM_SIGN_IN_PER_MINUTE: '100000',
    ...env,
  });
  const context = openContext(config, 10);
  const app = createApp(context);
  const people = await createPeople(context);
  const group = await createGroup(context, people.owner, 'Test Group');
  const foreignGroup = await createGroup(context, people.foreign, 'Foreign Group');
  const owner = await actorIn(context, people.owner, group);
  await inTransaction(context.database, owner, async (tx) => {
    for (const role of ROLES) {
      if (role === 'owner') continue;
      await tx.insert(membership).values({ groupId: owner.groupId, personId: people[role].personId, role });
    }
  });
  const actors = {
    reader: await actorIn(context, people.reader, group),
    contributor: await actorIn(context, people.contributor, group),
    curator: await actorIn(context, people.curator, group),
    owner,
    foreign: await actorIn(context, people.foreign, foreignGroup),
  };
  const agents = {
    reader: await agentOf(context, app, 'reader'),
    contributor: await agentOf(context, app, 'contributor'),
    curator: await agentOf(context, app, 'curator'),
    owner: await agentOf(context, app, 'owner'),
    foreign: await agentOf(context, app, 'foreign'),
    nobody: agentWith(app, null),
  };
  return {
    context,
    app,
    group,
    foreignGroup,
    api: (below) => `/api/groups/${group}/${below}`,
    agents,
    actors,
    ownerUrl: database.ownerUrl,
    async close() {
      await closeContext(context);
      await database.drop();
      await rm(dataDir, { recursive: true, force: true });
    },
  };
}

type Who = Role | 'foreign';
const emailOf = (who: Who) => `${who}@example.org`;

async function createPeople(context: Context) {
  const passwordHash = await hashPassword(PASSWORD);
  const names: Who[] = [...ROLES, 'foreign'];
  const rows = await inTransaction(context.database, { groupId: null, personId: null }, (tx) =>
    tx
      .insert(person)
      .values(names.map((who) => ({ email: emailOf(who), name: `Test ${who}`, passwordHash })))
      .returning(),
  );
  const of = (who: Who) => {
    const row = rows.find((candidate) => candidate.email === emailOf(who));
    if (row === undefined) throw new Error(`no person ${who}`);
    return { personId: row.id, name: row.name, email: row.email, sessionId: '' };
  };
  return {
    reader: of('reader'),
    contributor: of('contributor'),
    curator: of('curator'),
    owner: of('owner'),
    foreign: of('foreign'),
  };
}

async function actorIn(
  context: Context,
  who: { personId: number; name: string; email: string; sessionId: string },
  group: string,
): Promise<GroupActor> {
  const actor = await memberOf(context, who, group);
  if (actor === null) throw new Error(`${who.name} is no member of ${group}`);
  await groupDetail(context, actor);
  return actor;
}

async function agentOf(context: Context, app: Express, who: Who): Promise<Agent> {
  const session = await signIn(context, { email: emailOf(who), password: PASSWORD }, 'tests');
  return agentWith(app, `idem_session=${session.token}`);
}

/** An agent with a session cookie, or a stranger. */
export function agentWith(app: Express | Server, cookie: string | null): Agent {
  const dress = (test: supertest.Test) => {
    const dressed = test.set('X-Idem', '1');
    return cookie === null ? dressed : dressed.set('Cookie', cookie);
  };
  return {
    cookie,
    get: (url) => dress(supertest(app).get(url)),
    post: (url, body) => dress(supertest(app).post(url)).send(body),
    patch: (url, body) => dress(supertest(app).patch(url)).send(body),
    delete: (url) => dress(supertest(app).delete(url)),
  };
}

/** Serves the world's application on a free port of the loopback. */
export async function listen(world: World): Promise<{ url: string; close(): Promise<void> }> {
  const server = createServer(world.app);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const address = server.address();
  if (address === null || typeof address === 'string') throw new Error('no port');
  return {
    url: `http://127.0.0.1:${address.port}`,
    close: () =>
      new Promise((resolve) => {
        server.close(() => resolve());
        server.closeAllConnections();
      }),
  };
}
