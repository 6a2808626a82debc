import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { inTransaction } from '../../db/client';
import { checkRegistry } from '../../server/services/registry-check';
import { giveVerdict, takeBackVerdict } from '../../server/services/verdicts';
import { addCatalogue, type FixtureCatalogue } from '../support/fixtures';
import { objectRows } from '../support/registry-rows';
import { createWorld, type World } from '../support/world';

let world: World;
let cat: FixtureCatalogue;
let round = 0;

beforeAll(async () => {
  world = await createWorld();
});
afterAll(async () => {
  const report = await checkRegistry(world.context.database, {
    id: world.actors.owner.groupId,
    slug: world.group,
  });
  expect(report.differences).toEqual([]);
  await world.close();
});

beforeEach(async () => {
  round += 1;
  const sources = Array.from({ length: 5 }, (_, i) => ({ raDeg: 200 + i / 3600, decDeg: 5, errArcsec: 0.5 }));
  cat = await addCatalogue(world, { label: `R${round}`, sources });
});

const entry = (i: number) => cat.entryIds[i] ?? 0;
const number = (i: number) => cat.numbers[i] ?? 0;
const merge = (numbers: number[], remark = '') =>
  world.agents.curator.post(world.api('objects/merge'), { numbers, remark });
const split = (objectNumber: number, entryIds: number[], remark = '') =>
  world.agents.curator.post(world.api('objects/split'), { number: objectNumber, entryIds, remark });
const give = (i: number, j: number, value: 'same' | 'different') =>
  giveVerdict(world.context, world.actors.curator, {
    entryA: entry(i),
    entryB: entry(j),
    value,
    grade: null,
    flags: [],
    remark: '',
    run: null,
  });

interface Said {
  entries: number[];
  value: string;
  grade: string | null;
  remark: string;
}

/** The verdicts in force among the catalogue's entries. */
async function inForce(): Promise<Said[]> {
  const { rows } = await inTransaction(world.context.database, world.actors.owner, (tx) =>
    tx.execute<Said & { [key: string]: unknown }>(sql`
      select array[f.entry_a, f.entry_b] as entries, f.value, f.grade, v.remark
      from verdict_in_force f join verdict v on v.id = f.verdict_id
      where f.entry_a between ${entry(0)} and ${entry(4)} order by f.entry_a, f.entry_b`),
  );
  return rows.map((row) => ({ ...row, entries: row.entries.map(Number) }));
}

async function partsOf(): Promise<(number | null)[]> {
  return (await objectRows(world, cat.entryIds)).map((row) => row.mergedInto);
}

describe('merging by hand', () => {
  it('joins objects under the lowest number by verdicts of the person, also named by a forwarding number', async () => {
    await give(2, 3, 'same');
    const res = await merge([number(3), number(0), number(1)], 'one nucleus');
    expect(res.status, res.text).toBe(200);
    expect(res.body).toEqual({ numbers: [number(0)], conflicts: 0 });
    expect(await partsOf()).toEqual([null, entry(0), entry(0), entry(0), null]);
    expect(await inForce()).toEqual([
      { entries: [entry(0), entry(1)], value: 'same', grade: 'certain', remark: 'one nucleus' },
      { entries: [entry(0), entry(2)], value: 'same', grade: 'certain', remark: 'one nucleus' },
      { entries: [entry(2), entry(3)], value: 'same', grade: null, remark: '' },
    ]);
  });

  it('counts the conflict when a verdict forbids it, and merges nothing', async () => {
    await give(0, 1, 'same');
    await give(1, 2, 'different');
    const res = await merge([number(0), number(2)]);
    expect(res.body).toEqual({ numbers: [number(0), number(2)], conflicts: 1 });
    expect(await partsOf()).toEqual([null, entry(0), null, null, null]);
  });

  it('refuses what is one object already and what is not there', async () => {
    await give(0, 1, 'same');
    const one = await merge([number(0), number(1)]);
    expect(one.status).toBe(422);
    expect(one.body).toMatchObject({ code: 'nothing-to-decide' });
    expect((await merge([number(0), 999_999])).status).toBe(404);
    expect((await merge([number(0)])).status).toBe(400);
    expect((await merge([number(0), -1])).status).toBe(400);
  });

  it('ten times at once makes one object', async () => {
    const answers = await Promise.all(Array.from({ length: 10 }, () => merge([number(0), number(1)])));
    expect(answers.map((res) => res.status).sort()).toEqual([200, ...Array<number>(9).fill(422)]);
    expect(await partsOf()).toEqual([null, entry(0), null, null, null]);
  });
});

describe('splitting by hand', () => {
  it("turns the 'same' verdicts between the parts into 'different' ones and gives the old number back", async () => {
    await merge([number(0), number(1), number(2)]);
    const res = await split(number(0), [entry(1)], 'a neighbour');
    expect(res.status, res.text).toBe(200);
    expect(res.body).toEqual({ numbers: [number(0), number(1)], conflicts: 0 });
    expect(await partsOf()).toEqual([null, null, entry(0), null, null]);
    expect(await inForce()).toEqual([
      { entries: [entry(0), entry(1)], value: 'different', grade: 'certain', remark: 'a neighbour' },
      { entries: [entry(0), entry(2)], value: 'same', grade: 'certain', remark: '' },
    ]);
  });

  it('keeps each part together where only the other part had joined it', async () => {
    // 1 and 2 hang on 0, and 3 hangs on 1: without 0 they fall into two pieces.
    for (const [i, j] of [
      [0, 1],
      [0, 2],
      [1, 3],
      [2, 4],
    ] as const)
      await give(i, j, 'same');
    const res = await split(number(0), [entry(0), entry(3), entry(4)]);
    expect(res.body).toEqual({ numbers: [number(0), number(1)], conflicts: 0 });
    expect(await partsOf()).toEqual([null, null, entry(1), entry(0), entry(0)]);
  });

  it('is undone by taking its verdicts back', async () => {
    await give(0, 1, 'same');
    const before = (await objectRows(world, cat.entryIds)).map((row) => ({ ...row, version: 0 }));
    await split(number(0), [entry(1)]);
    const { rows } = await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute<{ id: number }>(sql`select max(id) as id from verdict where entry_a = ${entry(0)}`),
    );
    await takeBackVerdict(world.context, world.actors.curator, rows[0]?.id ?? 0);
    // The 'same' that the split took back stays taken back: say it again.
    await give(0, 1, 'same');
    expect((await objectRows(world, cat.entryIds)).map((row) => ({ ...row, version: 0 }))).toEqual(before);
  });

  it('refuses foreign sources, all sources, a forwarding number and a missing one', async () => {
    await give(0, 1, 'same');
    for (const [objectNumber, entries] of [
      [number(0), [entry(2)]],
      [number(0), [entry(0), entry(1)]],
      [number(1), [entry(1)]],
    ] as const) {
      const res = await split(objectNumber, [...entries]);
      expect(res.status).toBe(422);
      expect(res.body).toMatchObject({ code: 'nothing-to-decide' });
    }
    expect((await split(999_999, [entry(0)])).status).toBe(404);
    expect((await split(number(0), [])).status).toBe(400);
  });

  it('leaves a trace on both objects', async () => {
    await give(0, 1, 'same');
    await split(number(0), [entry(1)], 'a neighbour');
    const { rows } = await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute(sql`select subject, action, detail from audit_event
        where detail->>'act' = 'split by hand' and subject in (${`object ${number(0)}`}, ${`object ${number(1)}`}) order by id`),
    );
    const detail = { act: 'split by hand', remark: 'a neighbour' };
    expect(rows).toEqual([
      {
        subject: `object ${number(1)}`,
        action: 'separated from object',
        detail: { ...detail, objects: [number(0)] },
      },
      {
        subject: `object ${number(0)}`,
        action: 'gave back objects',
        detail: { ...detail, objects: [number(1)] },
      },
    ]);
  });
});

describe('who may merge and split', () => {
  it('refuses strangers, contributors and other groups', async () => {
    const calls = [
      ['objects/merge', { numbers: [number(0), number(1)] }],
      ['objects/split', { number: number(0), entryIds: [entry(0)] }],
    ] as const;
    for (const [below, body] of calls) {
      expect((await world.agents.nobody.post(world.api(below), body)).status).toBe(401);
      expect((await world.agents.contributor.post(world.api(below), body)).status).toBe(403);
      expect((await world.agents.foreign.post(world.api(below), body)).status).toBe(404);
      expect(
        (await world.agents.foreign.post(`/api/groups/${world.foreignGroup}/${below}`, body)).status,
      ).toBe(404);
    }
    expect(await partsOf()).toEqual([null, null, null, null, null]);
  });
});
