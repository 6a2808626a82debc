import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { FindAnswer } from '../../shared/schemas/find';
import type { Today } from '../../shared/schemas/today';
import { addCatalogue, type FixtureCatalogue } from '../support/fixtures';
import { createWorld, type World } from '../support/world';

describe('the find field', () => {
  let world: World;
  let wick: FixtureCatalogue;
  beforeAll(async () => {
    world = await createWorld();
    wick = await addCatalogue(world, {
      label: 'WICK',
      sources: [
        { raDeg: 150.1, decDeg: 2.2, designation: 'WICK 0042' },
        { raDeg: 150.1001, decDeg: 2.2, designation: 'WICK 0042B' },
        { raDeg: 10, decDeg: -30, designation: 'α Cen' },
        { raDeg: 10, decDeg: -31, designation: 'COAL J123456.7-123456' },
        { raDeg: 10, decDeg: -32, designation: '7' },
      ],
    });
  });
  afterAll(() => world.close());
  const find = async (q: string, more = '') =>
    (await world.agents.reader.get(world.api(`find?q=${encodeURIComponent(q)}${more}`))).body as FindAnswer;
  const names = (answer: FindAnswer) => answer.exact.map((one) => one.name);

  it.each(['WICK 0042', 'wick42', 'Wick  042', 'WICK_42', 'wick 00042'])('takes %s for WICK 0042 and nothing else', async (q) => {
    const answer = await find(q);
    expect([answer.read, names(answer)]).toEqual(['name', ['WICK 0042']]);
  });

  it.each(['alpha Cen', 'alf cen', 'Α CEN'])('takes %s for α Cen', async (q) => {
    expect(names(await find(q))).toEqual(['α Cen']);
  });

  it('keeps a component apart from its parent', async () => {
    expect(names(await find('wick 42 b'))).toEqual(['WICK 0042B']);
  });

  it('offers near misses with what differs, and takes none of them', async () => {
    const answer = await find('WICK 0043');
    expect(answer.exact).toEqual([]);
    expect(answer.nearMisses[0]).toMatchObject({ alias: 'WICK 0042', reason: 'one digit differs' });
  });

  it.each(['150.1 2.2', '10:00:24.0 +02:12:00', '10 00 24.0 +02 12 00', '10h00m24.0s +02d12m00s'])(
    'reads %s as a position',
    async (q) => {
      const answer = await find(q, '&radiusArcsec=1');
      expect([answer.read, names(answer)]).toEqual(['position', ['WICK 0042', 'WICK 0042B']]);
      expect(answer.exact[0]?.sepArcsec).toBeCloseTo(0, 3);
    },
  );

  it('reads a number as an object number, and says when it forwards', async () => {
    expect(await find('#1')).toMatchObject({ read: 'number', exact: [{ number: 1 }], forwardedFrom: null });
    await world.agents.contributor
      .post(world.api('verdicts'), { entryA: wick.entryIds[0], entryB: wick.entryIds[1], value: 'same' })
      .expect(201);
    expect(await find('2')).toMatchObject({ exact: [{ number: 1 }], forwardedFrom: 2 });
    expect(names(await find('wick 42b'))).toEqual(['WICK 0042']);
  });

  it('finds nothing in another group', async () => {
    const answer = await world.agents.foreign.get(`/api/groups/${world.foreignGroup}/find?q=wick42`);
    expect(answer.body).toMatchObject({ exact: [], nearMisses: [] });
  });

  it('refuses an empty text', async () => {
    await world.agents.reader.get(world.api('find?q=')).expect(400);
  });

  it('counts what waits on the first page', async () => {
    const today = (await world.agents.reader.get(world.api('today'))).body as Today;
    expect(today).toMatchObject({ catalogues: 1, sources: 5, objects: 4, mergedObjects: 1, conflicts: 0, contestedNames: 0 });
  });
});
