import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createApp } from '../../server/app';
import { agentWith, createWorld, type World } from '../support/world';

const GOOD = { email: 'owner@example.org', password: 'a password for tests' };

function cookieOf(answer: { headers: Record<string, unknown> }): string {
  const [first] = answer.headers['set-cookie'] as string[];
  return first?.split(';')[0] ?? '';
}

describe('sign-in', () => {
  let world: World;
  beforeAll(async () => {
    world = await createWorld();
  });
  afterAll(() => world.close());

  it('opens a session whose cookie scripts cannot read and other sites do not send', async () => {
    const answer = await world.agents.nobody.post('/api/session', GOOD);
    expect(answer.status).toBe(204);
    const [cookie] = answer.headers['set-cookie'] as unknown as string[];
    expect(cookie).toMatch(/HttpOnly/);
    expect(cookie).toMatch(/SameSite=Lax/);
    const me = await agentWith(world.app, cookieOf(answer)).get('/api/session');
    expect(me.body).toMatchObject({
      person: { email: 'owner@example.org' },
      memberships: [{ group: world.group, role: 'owner' }],
      needsSetup: false,
    });
  });

  it('gives the same answer for a wrong password and an unknown address', async () => {
    const wrong = await world.agents.nobody.post('/api/session', { ...GOOD, password: 'wrong' });
    const unknown = await world.agents.nobody.post('/api/session', { ...GOOD, email: 'nobody@example.org' });
    expect(wrong.status).toBe(401);
    expect(wrong.headers['content-type']).toContain('application/problem+json');
    expect(wrong.body).toEqual(unknown.body);
    expect(wrong.body).toMatchObject({ code: 'sign-in-failed' });
  });

  it('names each bad field', async () => {
    const answer = await world.agents.nobody.post('/api/session', { email: 'x', password: '' });
    expect(answer.status).toBe(400);
    const paths = (answer.body as { errors: { path: string }[] }).errors.map((error) => error.path);
    expect(paths.sort()).toEqual(['email', 'password']);
  });

  it('ends one session, or all of a person', async () => {
    const cookies = [];
    const reader = { email: 'reader@example.org', password: GOOD.password };
    for (let i = 0; i < 3; i += 1) cookies.push(cookieOf(await world.agents.nobody.post('/api/session', reader)));
    const [first, second, third] = cookies.map((cookie) => agentWith(world.app, cookie));
    const signedIn = async (agent: typeof first) =>
      ((await agent?.get('/api/session'))?.body as { person: unknown }).person !== null;
    await first?.delete('/api/session').expect(204);
    expect([await signedIn(first), await signedIn(second), await signedIn(third)]).toEqual([false, true, true]);
    await second?.delete('/api/session/all').expect(204);
    expect([await signedIn(second), await signedIn(third)]).toEqual([false, false]);
  });

  it('takes no token that was changed or signed with another secret', async () => {
    const cookie = cookieOf(await world.agents.nobody.post('/api/session', GOOD));
    const [head, body, signature] = cookie.replace('idem_session=', '').split('.');
    const forged = [head, body, (signature ?? '').split('').reverse().join('')].join('.');
    const answer = await agentWith(world.app, `idem_session=${forged}`).get('/api/groups');
    expect(answer.status).toBe(401);
  });

  it('slows down guessing', async () => {
    const slow = createApp({ ...world.context, config: { ...world.context.config, signInPerMinute: 3 } });
    const guess = () => agentWith(slow, null).post('/api/session', { ...GOOD, password: 'guess' });
    const answers = [];
    for (let i = 0; i < 4; i += 1) answers.push((await guess()).status);
    expect(answers).toEqual([401, 401, 401, 429]);
  });

  it('loses its rights at once with the membership', async () => {
    const { personId } = world.actors.contributor;
    await world.agents.contributor.get(world.api('members')).expect(200);
    await world.agents.owner.delete(world.api(`members/${personId}`)).expect(204);
    await world.agents.contributor.get(world.api('members')).expect(404);
  });
});

describe('the first set-up', () => {
  let world: World;
  beforeAll(async () => {
    world = await createWorld();
  });
  afterAll(() => world.close());
  const FIRST = { name: 'First', email: 'first@example.org', password: 'long enough password', groupName: 'My Group' };

  it('is refused once an account exists', async () => {
    const answer = await world.agents.nobody.post('/api/setup', FIRST);
    expect(answer.status).toBe(409);
    expect(answer.body).toMatchObject({ code: 'already-set-up' });
  });

  it('makes exactly one owner when ten people try at once on an empty installation', async () => {
    await world.context.database.pool.query('delete from person');
    const before = await world.agents.nobody.get('/api/session');
    expect(before.body).toMatchObject({ needsSetup: true });
    const answers = await Promise.all(
      Array.from({ length: 10 }, (_, i) =>
        world.agents.nobody.post('/api/setup', { ...FIRST, email: `first${i}@example.org` }).then((answer) => answer),
      ),
    );
    const statuses = answers.map((answer) => answer.status).sort();
    expect(statuses).toEqual([201, ...Array<number>(9).fill(409)]);
    const winner = answers.find((answer) => answer.status === 201);
    const state = await agentWith(world.app, winner === undefined ? '' : cookieOf(winner)).get('/api/session');
    expect(state.body).toMatchObject({ memberships: [{ group: 'my-group', role: 'owner' }] });
  });

  it('refuses a short password with its field', async () => {
    const answer = await world.agents.nobody.post('/api/setup', { ...FIRST, password: 'short' });
    expect(answer.status).toBe(400);
    expect(answer.body).toMatchObject({ errors: [{ path: 'password' }] });
  });
});
