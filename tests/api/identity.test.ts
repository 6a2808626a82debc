import fc from 'fast-check';
import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { inTransaction } from '../../db/client';
import { applyIdentity } from '../../server/services/identity';
import { checkRegistry } from '../../server/services/registry-check';
import { giveVerdict, takeBackVerdict } from '../../server/services/verdicts';
import { VERDICT_VALUES } from '../../shared/words';
import { addCatalogue, type FixtureSource } from '../support/fixtures';
import { objectRows } from '../support/registry-rows';
import { createWorld, type World } from '../support/world';

let world: World;
let labels = 0;

beforeAll(async () => {
  world = await createWorld();
});
afterAll(() => world.close());

const freshLabel = () => `CAT${(labels += 1)}`;
const line = (count: number, errArcsec?: number): FixtureSource[] =>
  Array.from({ length: count }, (_, i) => ({
    raDeg: 10 + i / 3600,
    decDeg: -30,
    ...(errArcsec === undefined ? {} : { errArcsec }),
  }));

async function fresh(sources: FixtureSource[]) {
  return addCatalogue(world, { label: freshLabel(), sources });
}

const give = (entryA: number, entryB: number, value: 'same' | 'different') =>
  giveVerdict(world.context, world.actors.curator, {
    entryA,
    entryB,
    value,
    grade: null,
    flags: [],
    remark: '',
    run: null,
  });

async function expectRebuildable(): Promise<void> {
  const report = await checkRegistry(world.context.database, {
    id: world.actors.owner.groupId,
    slug: world.group,
  });
  expect(report.differences).toEqual([]);
}

describe('any sequence of verdicts and of taking them back', () => {
  const SIZE = 7;
  const step = fc.oneof(
    {
      weight: 4,
      arbitrary: fc.tuple(
        fc.constant('give' as const),
        fc.nat(SIZE - 1),
        fc.nat(SIZE - 1),
        fc.constantFrom(...VERDICT_VALUES),
      ),
    },
    { weight: 1, arbitrary: fc.tuple(fc.constant('take back' as const), fc.nat(1000)) },
  );

  it('leaves the registry that its log alone gives, and undoing everything leaves the one of the beginning', async () => {
    await fc.assert(
      fc.asyncProperty(fc.array(step, { minLength: 4, maxLength: 16 }), async (steps) => {
        // Errors that single precision holds exactly, so that the position of the beginning is the stored one.
        const { entryIds } = await fresh(line(SIZE, 0.25));
        const before = await objectRows(world, entryIds);
        const standing: number[] = [];
        for (const taken of steps) {
          if (taken[0] === 'give') {
            const [, i, j, value] = taken;
            const [entryA = 0, entryB = 0] = [entryIds[i], entryIds[j]];
            if (i === j) continue;
            const { verdict } = await giveVerdict(world.context, world.actors.curator, {
              entryA,
              entryB,
              value,
              grade: null,
              flags: [],
              remark: '',
              run: null,
            });
            if (verdict !== null) standing.push(verdict.id);
          } else if (standing.length > 0) {
            const [id = 0] = standing.splice(taken[1] % standing.length, 1);
            await takeBackVerdict(world.context, world.actors.curator, id);
          }
        }
        await expectRebuildable();
        for (const id of standing) await takeBackVerdict(world.context, world.actors.curator, id);
        await expectRebuildable();
        const after = await objectRows(world, entryIds);
        expect(after.map((row) => ({ ...row, version: 0 }))).toEqual(
          before.map((row) => ({ ...row, version: 0 })),
        );
      }),
      { numRuns: 12 },
    );
  });

  it('gives the same whether it is brought in piece by piece or in one pass over the group', async () => {
    const { entryIds } = await fresh(line(6, 0.25));
    const e = (i: number) => entryIds[i] ?? 0;
    await give(e(0), e(3), 'different');
    const links = [
      [0, 1],
      [2, 3],
      [1, 2],
      [4, 5],
    ] as const;
    for (const [i, j] of links) await give(e(i), e(j), 'same');
    const piecewise = await objectRows(world, entryIds);
    const written = await inTransaction(world.context.database, world.actors.owner, (tx) =>
      applyIdentity(tx, world.actors.owner, 'group'),
    );
    expect(written.changed).toBe(0);
    await inTransaction(world.context.database, world.actors.owner, async (tx) => {
      await tx.execute(sql`update object set merged_into = null, entries = 1, ra_deg = 0
        where id between ${e(0)} and ${e(5)}`);
      await applyIdentity(tx, world.actors.owner, 'group');
    });
    // A forwarding object has no position of its own that anybody would see.
    const visible = (rows: typeof piecewise) =>
      rows.map((row) => ({ ...row, version: 0, raDeg: row.mergedInto === null ? row.raDeg : null }));
    expect(visible(await objectRows(world, entryIds))).toEqual(visible(piecewise));
  });
});

describe('the merged position', () => {
  it('is found across RA 0/360', async () => {
    const { entryIds } = await fresh([
      { raDeg: 359.9999, decDeg: 0, errArcsec: 0.5 },
      { raDeg: 0.0003, decDeg: 0, errArcsec: 0.5 },
    ]);
    await give(entryIds[0] ?? 0, entryIds[1] ?? 0, 'same');
    const [live] = await objectRows(world, entryIds);
    expect(live?.raDeg).toBeCloseTo(0.0001, 11);
    expect(live?.errArcsec).toBeCloseTo(0.5 / Math.SQRT2, 12);
  });

  it('is found at a pole', async () => {
    const { entryIds } = await fresh([
      { raDeg: 0, decDeg: 89.9999, errArcsec: 0.5 },
      { raDeg: 180, decDeg: 89.9997, errArcsec: 0.5 },
    ]);
    await give(entryIds[0] ?? 0, entryIds[1] ?? 0, 'same');
    const [live] = await objectRows(world, entryIds);
    expect(live?.raDeg).toBeCloseTo(180, 6);
    expect(live?.decDeg).toBeCloseTo(89.9999, 11);
  });

  it('leaves sources without an error aside while one states it, and is the plain mean when none does', async () => {
    const { entryIds } = await fresh([
      { raDeg: 10, decDeg: 0 },
      { raDeg: 10.0002, decDeg: 0 },
      { raDeg: 10.0009, decDeg: 0, errArcsec: 0.25 },
    ]);
    const [x = 0, y = 0, z = 0] = entryIds;
    await give(x, y, 'same');
    expect((await objectRows(world, [x]))[0]).toMatchObject({ errArcsec: null, entries: 2 });
    expect((await objectRows(world, [x]))[0]?.raDeg).toBeCloseTo(10.0001, 11);
    await give(y, z, 'same');
    expect((await objectRows(world, [x]))[0]).toMatchObject({ raDeg: 10.0009, errArcsec: 0.25, entries: 3 });
  });
});

describe('the preferred name', () => {
  it('stays when a person chose it, and is the designation of the own entry otherwise', async () => {
    const { entryIds, label } = await fresh(line(3, 0.25));
    const [x = 0, y = 0, z = 0] = entryIds;
    await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute(sql`update object set name = 'Chosen One', name_chosen = true where id = ${x}`),
    );
    await give(x, y, 'same');
    await give(y, z, 'same');
    const names = (await objectRows(world, entryIds)).map((row) => row.name);
    expect(names).toEqual(['Chosen One', `${label} 2`, `${label} 3`]);
  });
});

describe('a name chosen while a verdict is on its way', () => {
  it('is not overwritten', async () => {
    const { entryIds } = await fresh(line(2, 0.25));
    const [x = 0, y = 0] = entryIds;
    const given = await inTransaction(world.context.database, world.actors.owner, async (tx) => {
      await tx.execute(sql`update object set name = 'Just Chosen', name_chosen = true where id = ${x}`);
      const waiting = give(x, y, 'same');
      await untilSomebodyWaits();
      return { waiting };
    });
    await given.waiting;
    expect((await objectRows(world, [x]))[0]).toMatchObject({
      name: 'Just Chosen',
      nameChosen: true,
      entries: 2,
    });
  });

  /** Looks until a transaction of this database waits for another one's lock. */
  async function untilSomebodyWaits(): Promise<void> {
    for (;;) {
      const { rows } = await world.context.database.pool.query<{ waiting: number }>(
        'select count(*) as waiting from pg_locks where not granted',
      );
      if ((rows[0]?.waiting ?? 0) > 0) return;
    }
  }
});

describe('objects that do not change', () => {
  it('keep their version when something else of the group does', async () => {
    const { entryIds } = await fresh(line(4, 0.25));
    const [w = 0, x = 0, y = 0, z = 0] = entryIds;
    await give(w, x, 'same');
    const before = await objectRows(world, [w, x]);
    await give(y, z, 'same');
    expect(await objectRows(world, [w, x])).toEqual(before);
  });
});
