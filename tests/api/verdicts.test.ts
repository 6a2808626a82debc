import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { inTransaction } from '../../db/client';
import { conflictList, verdictResult, type VerdictResult } from '../../shared/schemas/verdict';
import { objectRows } from '../support/registry-rows';
import { addCatalogue, type FixtureCatalogue } from '../support/fixtures';
import { createWorld, type Agent, type World } from '../support/world';

let world: World;
let a: FixtureCatalogue;
let b: FixtureCatalogue;
let round = 0;

beforeAll(async () => {
  world = await createWorld();
});
afterAll(() => world.close());

/** Two catalogues of eleven sources each, 0.1 deg apart; source i of both lies at the same place but 1 arcsec. */
beforeEach(async () => {
  round += 1;
  const sources = (offsetDeg: number, errArcsec: number) =>
    Array.from({ length: 11 }, (_, i) => ({ raDeg: 150 + i * 0.1, decDeg: 2 + offsetDeg, errArcsec }));
  a = await addCatalogue(world, { label: `A${round}`, sources: sources(0, 0.25) });
  b = await addCatalogue(world, { label: `B${round}`, sources: sources(1 / 3600, 0.5) });
});

const entry = (catalogue: FixtureCatalogue, i: number) => catalogue.entryIds[i] ?? 0;
const number = (catalogue: FixtureCatalogue, i: number) => catalogue.numbers[i] ?? 0;

async function give(
  agent: Agent,
  entryA: number,
  entryB: number,
  value: 'same' | 'different' | 'unsure',
  more: object = {},
): Promise<VerdictResult> {
  const res = await agent.post(world.api('verdicts'), { entryA, entryB, value, ...more });
  expect(res.status, res.text).toBe(201);
  return verdictResult.parse(res.body);
}

const idOf = (result: VerdictResult) => result.verdict?.id ?? 0;

describe("a verdict 'same'", () => {
  it('makes one object, with the lower number and the weighted position, and the other forwards', async () => {
    const result = await give(world.agents.contributor, entry(b, 0), entry(a, 0), 'same', {
      grade: 'probable',
      flags: ['blend'],
      remark: 'clear on the chart',
    });
    expect(result).toMatchObject({ objectA: number(a, 0), objectB: number(a, 0), conflict: false });
    expect(result.verdict).toMatchObject({
      value: 'same',
      grade: 'probable',
      flags: ['blend'],
      remark: 'clear on the chart',
      origin: 'person',
      by: 'Test contributor',
    });
    const [live, forwarding] = await objectRows(world, [entry(a, 0), entry(b, 0)]);
    expect(live).toMatchObject({ mergedInto: null, entries: 2, name: `A${round} 1`, version: 2 });
    expect(forwarding).toMatchObject({ mergedInto: entry(a, 0), entries: 0, version: 2 });
    // Weights 1/0.25² = 16 and 1/0.5² = 4 by hand: a fifth of the way, error 1/sqrt(20).
    expect(live?.raDeg).toBeCloseTo(150, 11);
    expect(live?.decDeg).toBeCloseTo(2 + 0.2 / 3600, 11);
    expect(live?.errArcsec).toBeCloseTo(1 / Math.sqrt(20), 12);
  });

  it('is undone by taking it back: numbers, names and positions are those of the beginning', async () => {
    const entries = [entry(a, 0), entry(b, 0)];
    const before = await objectRows(world, entries);
    const given = await give(world.agents.contributor, entry(a, 0), entry(b, 0), 'same');
    const res = await world.agents.contributor.delete(world.api(`verdicts/${idOf(given)}`));
    expect(res.status, res.text).toBe(200);
    expect(res.body).toEqual({
      verdict: null,
      objectA: number(a, 0),
      objectB: number(b, 0),
      conflict: false,
    });
    const after = await objectRows(world, entries);
    expect(after.map((row) => ({ ...row, version: 1 }))).toEqual(before);
    expect(after.map((row) => row.version)).toEqual([3, 3]);
  });

  it('leaves a trace on every object it moves', async () => {
    await give(world.agents.contributor, entry(a, 0), entry(b, 0), 'same');
    const events = await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute<{ subject: string; action: string; objects: number[] }>(sql`
        select subject, action, detail->'objects' as objects from audit_event
        where subject in (${`object ${number(a, 0)}`}, ${`object ${number(b, 0)}`}) order by id`),
    );
    expect(events.rows).toEqual([
      { subject: `object ${number(b, 0)}`, action: 'merged into object', objects: [number(a, 0)] },
      { subject: `object ${number(a, 0)}`, action: 'took in objects', objects: [number(b, 0)] },
    ]);
  });
});

describe('the latest verdict on a pair', () => {
  it('counts, and taking it back puts the one before in force again', async () => {
    const { contributor, curator } = world.agents;
    const first = await give(contributor, entry(a, 1), entry(b, 1), 'same');
    const second = await give(curator, entry(b, 1), entry(a, 1), 'different');
    expect(second).toMatchObject({ objectA: number(b, 1), objectB: number(a, 1) });
    const undone = await curator.delete(world.api(`verdicts/${idOf(second)}`));
    expect(undone.body).toMatchObject({ verdict: { id: idOf(first), value: 'same' }, objectA: number(a, 1) });
  });

  it("'unsure' joins nothing", async () => {
    const result = await give(world.agents.contributor, entry(a, 1), entry(b, 1), 'unsure');
    expect(result).toMatchObject({
      objectA: number(a, 1),
      objectB: number(b, 1),
      verdict: { value: 'unsure' },
    });
  });
});

describe('a chain that would join a pair kept apart', () => {
  it('is broken at its latest link, which is listed as a conflict until one of them is taken back', async () => {
    const { contributor, reader } = world.agents;
    const [x, y, z] = [entry(a, 2), entry(b, 2), entry(a, 3)];
    const apart = await give(contributor, x, z, 'different');
    await give(contributor, x, y, 'same');
    const closing = await give(contributor, y, z, 'same');
    expect(closing).toMatchObject({ conflict: true, objectA: number(a, 2), objectB: number(a, 3) });

    const listed = conflictList.parse((await reader.get(world.api('conflicts'))).body);
    expect(listed.total).toBe(1);
    expect(listed.items[0]).toMatchObject({
      sameVerdictId: idOf(closing),
      differentVerdictId: idOf(apart),
      objectNumbers: [number(a, 2), number(a, 3)],
    });
    const [conflict] = listed.items;
    expect(new Set([conflict?.a.entryId, conflict?.b.entryId])).toEqual(new Set([y, z]));
    expect(new Set([conflict?.forbiddenA.entryId, conflict?.forbiddenB.entryId])).toEqual(new Set([x, z]));
    expect(new Set(conflict?.chain.map((link) => link.designation))).toEqual(
      new Set([`A${round} 3`, `B${round} 3`, `A${round} 4`]),
    );

    const undone = await contributor.delete(world.api(`verdicts/${idOf(apart)}`));
    expect(undone.body).toMatchObject({ objectA: number(a, 2), objectB: number(a, 2), conflict: false });
    expect((await reader.get(world.api('conflicts'))).body).toEqual({ items: [], total: 0 });
  });

  it("appears when 'different' is said inside an object, and the object comes apart", async () => {
    const { contributor, reader } = world.agents;
    await give(contributor, entry(a, 4), entry(b, 4), 'same');
    await give(contributor, entry(b, 4), entry(a, 5), 'same');
    const apart = await give(contributor, entry(a, 4), entry(a, 5), 'different');
    expect(apart).toMatchObject({ conflict: true, objectA: number(a, 4), objectB: number(a, 5) });
    const listed = conflictList.parse((await reader.get(world.api('conflicts'))).body);
    expect(listed.total).toBe(1);
    await contributor.delete(world.api(`verdicts/${idOf(apart)}`));
  });
});

describe('ten people at once', () => {
  it('lose no verdict on the same pair, and the last one counts', async () => {
    const values = ['same', 'different'] as const;
    const results = await Promise.all(
      Array.from({ length: 10 }, (_, i) =>
        give(world.agents.contributor, entry(a, 6), entry(b, 6), values[i % 2] ?? 'same'),
      ),
    );
    const ids = results.map(idOf);
    expect(new Set(ids).size).toBe(10);
    const last = results.find((result) => idOf(result) === Math.max(...ids));
    const [row, other] = await objectRows(world, [entry(a, 6), entry(b, 6)]);
    expect(other?.mergedInto).toBe(last?.verdict?.value === 'same' ? row?.id : null);
    expect(row?.mergedInto).toBeNull();
  });

  it('join eleven sources of a chain into one object', async () => {
    await Promise.all(
      Array.from({ length: 10 }, (_, i) =>
        give(world.agents.contributor, entry(a, i), entry(a, i + 1), 'same'),
      ),
    );
    const rows = await objectRows(world, a.entryIds);
    expect(rows.map((row) => row.mergedInto)).toEqual([null, ...Array<number>(10).fill(entry(a, 0))]);
    expect(rows[0]?.entries).toBe(11);
  });

  it('take one verdict back once', async () => {
    const given = await give(world.agents.contributor, entry(a, 7), entry(b, 7), 'same');
    const answers = await Promise.all(
      Array.from({ length: 10 }, () => world.agents.curator.delete(world.api(`verdicts/${idOf(given)}`))),
    );
    expect(answers.map((res) => res.status).sort()).toEqual([200, ...Array<number>(9).fill(409)]);
    expect(answers.find((res) => res.status === 409)?.body).toMatchObject({ code: 'already-taken-back' });
  });
});

describe('who may say what', () => {
  it('refuses strangers, readers and other groups', async () => {
    const body = { entryA: entry(a, 8), entryB: entry(b, 8), value: 'same' };
    const { nobody, reader, foreign } = world.agents;
    expect((await nobody.post(world.api('verdicts'), body)).status).toBe(401);
    expect((await reader.post(world.api('verdicts'), body)).status).toBe(403);
    expect((await foreign.post(world.api('verdicts'), body)).status).toBe(404);
    expect((await foreign.post(`/api/groups/${world.foreignGroup}/verdicts`, body)).status).toBe(404);
    expect((await nobody.get(world.api('conflicts'))).status).toBe(401);
    const rows = await objectRows(world, [entry(a, 8), entry(b, 8)]);
    expect(rows.map((row) => row.version)).toEqual([1, 1]);
  });

  it("lets a contributor take back only their own, and a curator everybody's", async () => {
    const { contributor, curator } = world.agents;
    const own = await give(contributor, entry(a, 8), entry(b, 8), 'same');
    const theirs = await give(curator, entry(a, 9), entry(b, 9), 'same');
    const refused = await contributor.delete(world.api(`verdicts/${idOf(theirs)}`));
    expect(refused.status).toBe(403);
    expect(refused.body).toMatchObject({ code: 'role-too-low' });
    expect((await curator.delete(world.api(`verdicts/${idOf(own)}`))).status).toBe(200);
  });

  it('knows no foreign verdict, and no row that takes one back as a verdict', async () => {
    const given = await give(world.agents.contributor, entry(a, 10), entry(b, 10), 'same');
    const foreign = `/api/groups/${world.foreignGroup}/verdicts/${idOf(given)}`;
    expect((await world.agents.foreign.delete(foreign)).status).toBe(404);
    expect((await world.agents.contributor.delete(world.api(`verdicts/${idOf(given)}`))).status).toBe(200);
    const takingBack = await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute<{ id: number }>(sql`select id from verdict where takes_back = ${idOf(given)}`),
    );
    const id = takingBack.rows[0]?.id ?? 0;
    expect(id).toBeGreaterThan(idOf(given));
    expect((await world.agents.curator.delete(world.api(`verdicts/${id}`))).status).toBe(404);
  });

  it.each([
    ['entryA', { entryA: 0 }],
    ['entryB', { entryB: 'x' }],
    ['value', { value: 'maybe' }],
    ['grade', { grade: 'sure' }],
    ['flags', { flags: ['blend', 'nonsense'] }],
    ['remark', { remark: 'x'.repeat(2001) }],
    ['run', { run: 1.5 }],
    ['a field nobody knows', { colour: 'red' }],
  ])('refuses a bad %s', async (_field, bad) => {
    const body = { entryA: entry(a, 8), entryB: entry(b, 8), value: 'same', ...bad };
    const res = await world.agents.contributor.post(world.api('verdicts'), body);
    expect(res.status).toBe(400);
    expect(res.body).toMatchObject({ code: 'bad-request' });
  });

  it('refuses a source against itself, a missing source and a missing run', async () => {
    const { contributor } = world.agents;
    const send = (body: object) => contributor.post(world.api('verdicts'), { value: 'same', ...body });
    expect((await send({ entryA: entry(a, 0), entryB: entry(a, 0) })).status).toBe(400);
    expect((await send({ entryA: entry(a, 0), entryB: 999_999_999 })).status).toBe(404);
    expect((await send({ entryA: entry(a, 0), entryB: entry(b, 0), run: 77 })).status).toBe(404);
  });

  it('asks to wait while the objects of a catalogue are not registered', async () => {
    await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute(sql`delete from object where id = ${entry(b, 10)}`),
    );
    const body = { entryA: entry(a, 10), entryB: entry(b, 10), value: 'same' };
    const res = await world.agents.contributor.post(world.api('verdicts'), body);
    expect(res.status).toBe(409);
    expect(res.body).toMatchObject({ code: 'not-ready' });
  });
});
