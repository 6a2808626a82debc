import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ALL_ROUTES } from '../../server/routes/all';
import type { Access, Route } from '../../server/route';
import { ROLES, roleAtLeast, type Role } from '../../shared/words';
import { agentWith, createWorld, type Agent, type World } from '../support/world';

/** A value for each parameter that is well formed and belongs to nobody. */
const NOBODYS: Record<string, string> = {
  personId: '999999',
  jobId: '00000000-0000-4000-8000-000000000000',
  fileId: '00000000-0000-4000-8000-000000000000',
  id: '999999',
  label: 'NOBODYS',
  run: '999999',
  seq: '999999',
  policyId: '999999',
  verdictId: '999999',
  number: '999999',
  aliasId: '999999',
  noteId: '999999',
};

function pathOf(route: Route, group: string): string {
  return route.path.replace(/:(\w+)/g, (_whole, name: string) => {
    if (name === 'group') return group;
    const value = NOBODYS[name];
    if (value === undefined) throw new Error(`${route.path}: give the parameter ${name} a value in NOBODYS`);
    return value;
  });
}

function call(agent: Agent, route: Route, group: string) {
  const path = pathOf(route, group);
  if (route.method === 'get') return agent.get(path);
  if (route.method === 'delete') return agent.delete(path);
  return route.method === 'post' ? agent.post(path, {}) : agent.patch(path, {});
}

const isRole = (access: Access): access is Role => ROLES.some((role) => role === access);
const nameOf = (route: Route) => `${route.method.toUpperCase()} ${route.path}`;

/** Signing out would end the session that the rest of the test uses. */
const ENDS_SESSION = new Set(['DELETE /api/session', 'DELETE /api/session/all']);

describe('every route x role x foreign group', () => {
  let world: World;
  beforeAll(async () => {
    world = await createWorld();
  });
  afterAll(() => world.close());

  it('has no two routes at the same place', () => {
    const names = ALL_ROUTES.map(nameOf);
    expect(names.filter((name, i) => names.indexOf(name) !== i)).toEqual([]);
  });

  it('lets nobody in who is not signed in, except where a route is public', async () => {
    for (const route of ALL_ROUTES.filter((each) => each.access !== 'anyone')) {
      const answer = await call(world.agents.nobody, route, world.group);
      expect({ route: nameOf(route), status: answer.status }).toEqual({ route: nameOf(route), status: 401 });
      expect(answer.body).toMatchObject({ code: 'not-signed-in' });
    }
  });

  it('refuses every role below the one a route needs, and lets the others through', async () => {
    for (const route of ALL_ROUTES) {
      if (!isRole(route.access)) continue;
      for (const role of ROLES) {
        const { status } = await call(world.agents[role], route, world.group);
        const seen = { route: nameOf(route), role, refused: status === 403 || status === 401, broken: status >= 500 };
        const refused = !roleAtLeast(role, route.access);
        expect(seen).toEqual({ route: nameOf(route), role, refused, broken: false });
      }
    }
  });

  it('answers 404 to an owner of another group, as for a group that does not exist', async () => {
    for (const route of ALL_ROUTES.filter((each) => isRole(each.access))) {
      const foreign = await call(world.agents.foreign, route, world.group);
      const missing = await call(world.agents.foreign, route, 'no-such-group');
      expect({ route: nameOf(route), foreign: foreign.status, missing: missing.status }).toEqual({
        route: nameOf(route),
        foreign: 404,
        missing: 404,
      });
      expect(foreign.body).toEqual(missing.body);
    }
  });

  it('answers any signed-in person on the routes that need only a sign-in', async () => {
    for (const route of ALL_ROUTES.filter((each) => each.access === 'person' && !ENDS_SESSION.has(nameOf(each)))) {
      const { status } = await call(world.agents.reader, route, world.group);
      expect({ route: nameOf(route), refused: status === 401 || status === 403 }).toEqual({
        route: nameOf(route),
        refused: false,
      });
    }
  });

  it('refuses a changing request without the header of this application', async () => {
    for (const route of ALL_ROUTES.filter((each) => each.method !== 'get')) {
      const bare = agentWith(world.app, world.agents.owner.cookie);
      const answer = await call(bare, route, world.group).unset('X-Idem');
      expect({ route: nameOf(route), status: answer.status }).toEqual({ route: nameOf(route), status: 403 });
    }
  });
});
