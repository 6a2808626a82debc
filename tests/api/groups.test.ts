import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createWorld, type World } from '../support/world';

describe('groups and members', () => {
  let world: World;
  beforeAll(async () => {
    world = await createWorld();
  });
  afterAll(() => world.close());

  it('tells name, role and sizes', async () => {
    const answer = await world.agents.reader.get(world.api('').replace(/\/$/, ''));
    expect(answer.body).toMatchObject({ name: 'Test Group', role: 'reader', catalogues: 0, objects: 0 });
  });

  it('founds a group whose founder is its owner, even when the name is taken', async () => {
    const answer = await world.agents.reader.post('/api/groups', { name: 'Test Group' });
    expect(answer.status).toBe(201);
    const { group } = answer.body as { group: string };
    expect(group).toMatch(/^test-group-\d+$/);
    const mine = await world.agents.reader.get('/api/groups');
    expect((mine.body as { items: unknown[] }).items).toContainEqual({ group, name: 'Test Group', role: 'owner' });
  });

  it('adds a new person with a first password, who can then sign in', async () => {
    const fresh = { email: 'New.Person@example.org', name: 'New Person', role: 'reader' };
    const without = await world.agents.owner.post(world.api('members'), fresh);
    expect(without.body).toMatchObject({ status: 409, code: 'account-missing' });
    const password = 'a first password';
    await world.agents.owner.post(world.api('members'), { ...fresh, password }).expect(201);
    await world.agents.nobody.post('/api/session', { email: 'new.person@EXAMPLE.org', password }).expect(204);
    const again = await world.agents.owner.post(world.api('members'), { ...fresh, password });
    expect(again.body).toMatchObject({ code: 'email-taken' });
  });

  it('never takes a password for an account that exists', async () => {
    const existing = { email: 'foreign@example.org', name: 'X', role: 'reader', password: 'another password' };
    await world.agents.owner.post(world.api('members'), existing).expect(201);
    await world.agents.nobody
      .post('/api/session', { email: existing.email, password: existing.password })
      .expect(401);
    await world.agents.owner.delete(world.api(`members/${world.actors.foreign.personId}`)).expect(204);
  });

  it('keeps an owner, also when two owners remove each other at once', async () => {
    const { personId } = world.actors.owner;
    const alone = await world.agents.owner.patch(world.api(`members/${personId}`), { role: 'reader' });
    expect(alone.body).toMatchObject({ status: 409, code: 'last-owner' });
    await world.agents.owner.patch(world.api(`members/${world.actors.curator.personId}`), { role: 'owner' }).expect(204);
    const both = await Promise.all([
      world.agents.owner.delete(world.api(`members/${world.actors.curator.personId}`)).then((a) => a.status),
      world.agents.curator.delete(world.api(`members/${personId}`)).then((a) => a.status),
    ]);
    expect(both.filter((status) => status === 204)).toHaveLength(1);
  });

  it('answers 404 for a member who is not there', async () => {
    const owner = (await world.agents.owner.get(world.api('members'))).status === 200 ? 'owner' : 'curator';
    const answer = await world.agents[owner].patch(world.api('members/999999'), { role: 'reader' });
    expect(answer.status).toBe(404);
  });
});
