import { spawnSync } from 'node:child_process';
import path from 'node:path';
import { sql, type SQL } from 'drizzle-orm';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { inTransaction } from '../../db/client';
import { checkRegistry, everyGroup, type RegistryReport } from '../../server/services/registry-check';
import { giveVerdict } from '../../server/services/verdicts';
import { addCatalogue, type FixtureCatalogue } from '../support/fixtures';
import { createWorld, type World } from '../support/world';

let world: World;
let cat: FixtureCatalogue;

beforeEach(async () => {
  world = await createWorld();
  const sources = Array.from({ length: 4 }, (_, i) => ({ raDeg: 30 + i / 3600, decDeg: 40, errArcsec: 0.5 }));
  cat = await addCatalogue(world, { label: 'CHK', sources });
  await give(0, 1, 'same');
  await give(1, 2, 'same');
  await give(0, 3, 'different');
  await give(2, 3, 'same');
});
afterEach(() => world.close());

const entry = (i: number) => cat.entryIds[i] ?? 0;
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

const check = (): Promise<RegistryReport> =>
  checkRegistry(world.context.database, { id: world.actors.owner.groupId, slug: world.group });

/** Damages the tables behind the back of the services. */
const damage = (statement: SQL) =>
  inTransaction(world.context.database, world.actors.owner, (tx) => tx.execute(statement));

function runCommand() {
  return spawnSync(process.execPath, ['--import', 'tsx', 'server/check-registry.ts'], {
    cwd: path.join(import.meta.dirname, '..', '..'),
    encoding: 'utf8',
    env: {
      PATH: process.env.PATH,
      IDEM_APP_DATABASE_URL: world.context.config.databaseUrl,
      IDEM_DATA_DIR: world.context.config.dataDir,
    },
  });
}

describe('checking the registry', () => {
  it('finds nothing in a registry that the services wrote, and counts what is there', async () => {
    expect(await check()).toEqual({
      group: world.group,
      objects: 4,
      liveObjects: 2,
      verdictsInForce: 4,
      conflicts: 1,
      differences: [],
      differenceCount: 0,
    });
  });

  it.each([
    [
      'an object that lost its forwarding',
      () => sql`update object set merged_into = null where id = ${entry(1)}`,
    ],
    [
      'an object merged without a verdict',
      () => sql`update object set merged_into = ${entry(0)} where id = ${entry(3)}`,
    ],
    ['a chain of forwarding', () => sql`update object set merged_into = ${entry(1)} where id = ${entry(2)}`],
    [
      'numbers that changed places',
      () => sql`update object set number = number + 100 where id = ${entry(0)}`,
    ],
    ['a wrong count of entries', () => sql`update object set entries = 2 where id = ${entry(0)}`],
    [
      'a verdict in force that is missing',
      () => sql`delete from verdict_in_force where entry_b = ${entry(2)}`,
    ],
    [
      'a verdict in force with another value',
      () => sql`update verdict_in_force set value = 'unsure' where entry_b = ${entry(2)}`,
    ],
    [
      'a verdict that never reached the registry',
      () => sql`insert into verdict (group_id, entry_a, entry_b, value, person_id)
      values (${world.actors.owner.groupId}, ${entry(0)}, ${entry(2)}, 'different', ${world.actors.owner.personId})`,
    ],
    ['an entry of a verdict without an object', () => sql`delete from object where id = ${entry(2)}`],
  ])('finds %s', async (_name, statement) => {
    await damage(statement());
    const report = await check();
    expect(report.differenceCount).toBeGreaterThan(0);
    expect(report.differences.length).toBe(report.differenceCount);
  });

  it('knows every group, though each is hidden from the others', async () => {
    const slugs = (await everyGroup(world.context.database)).map(({ slug }) => slug);
    expect(slugs).toEqual([world.group, world.foreignGroup]);
  });
});

describe('the command', () => {
  it('prints a line for each group and ends with 0', () => {
    const { status, stdout, stderr } = runCommand();
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    expect(stdout).toBe(
      `${world.group}: 4 objects (2 live), 4 verdicts in force, 1 conflicts: the same as rebuilt\n` +
        `${world.foreignGroup}: 0 objects (0 live), 0 verdicts in force, 0 conflicts: the same as rebuilt\n`,
    );
  });

  it('says what differs and ends with 1', async () => {
    await damage(sql`update object set merged_into = null where id = ${entry(1)}`);
    const { status, stdout } = runCommand();
    expect(status).toBe(1);
    expect(stdout).toContain(
      `${world.group}: 4 objects (3 live), 4 verdicts in force, 1 conflicts: 1 DIFFERENCES\n`,
    );
    expect(stdout).toContain(
      `object ${cat.numbers[1]}: is live, by the log forwards to the object of entry ${entry(0)}`,
    );
  });
});
