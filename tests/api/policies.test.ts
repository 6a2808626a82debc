import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { inTransaction } from '../../db/client';
import { jobAccepted } from '../../shared/schemas/job';
import {
  policyCount,
  runDetail,
  type PolicyCount,
  type PolicyRule,
  type RunDetail,
} from '../../shared/schemas/run';
import { getJob, JobCancelled, runJob } from '../../server/services/jobs';
import { workOnPolicy } from '../../server/services/policy-work';
import { checkRegistry } from '../../server/services/registry-check';
import { createRun } from '../../server/services/runs';
import { giveVerdict, takeBackVerdict } from '../../server/services/verdicts';
import { JOB_KIND_WORK } from '../../server/jobs/kinds';
import { addCatalogue, runJobs, type FixtureCatalogue } from '../support/fixtures';
import { objectRows } from '../support/registry-rows';
import { createWorld, type World } from '../support/world';

let world: World;
let a: FixtureCatalogue;
let b: FixtureCatalogue;
let run: number;
let round = 0;

const ARCSEC = 1 / 3600;
const RULE: PolicyRule = { maxSepArcsec: 1, mutualBest: true, noRival: true, grade: 'probable' };
/** Separations of B from A, arcsec, place by place; a second source of B stands 1.5" from place 5. */
const SEPARATIONS = [0.1, 0.2, 0.3, 0.4, 1.5, 0.5];

beforeAll(async () => {
  world = await createWorld();
});
afterAll(() => world.close());

beforeEach(async () => {
  round += 1;
  a = await addCatalogue(world, {
    label: `A${round}`,
    sources: SEPARATIONS.map((_, i) => ({ raDeg: 10 + i, decDeg: 0, errArcsec: 0.25 })),
  });
  b = await addCatalogue(world, {
    label: `B${round}`,
    sources: [
      ...SEPARATIONS.map((sep, i) => ({ raDeg: 10 + i, decDeg: sep * ARCSEC, errArcsec: 0.5 })),
      { raDeg: 15, decDeg: -1.5 * ARCSEC, errArcsec: 0.5 },
    ],
  });
  const started = await createRun(world.context, world.actors.curator, {
    catalogues: [a.label, b.label],
    radiusArcsec: 2,
    title: '',
  });
  run = started.run;
  await runJobs(world);
});

const entry = (catalogue: FixtureCatalogue, i: number) => catalogue.entryIds[i] ?? 0;
const give = (entryA: number, entryB: number, value: 'same' | 'different' | 'unsure') =>
  giveVerdict(world.context, world.actors.curator, {
    entryA,
    entryB,
    value,
    grade: null,
    flags: [],
    remark: '',
    run: null,
  });

async function count(rule: PolicyRule): Promise<PolicyCount> {
  const res = await world.agents.curator.post(world.api(`runs/${run}/policy/count`), rule);
  expect(res.status, res.text).toBe(200);
  return policyCount.parse(res.body);
}

async function apply(rule: PolicyRule): Promise<string> {
  const res = await world.agents.curator.post(world.api(`runs/${run}/policies`), rule);
  expect(res.status, res.text).toBe(202);
  return jobAccepted.parse(res.body).jobId;
}

async function detail(): Promise<RunDetail> {
  return runDetail.parse((await world.agents.reader.get(world.api(`runs/${run}`))).body);
}

async function expectRebuildable(): Promise<void> {
  const report = await checkRegistry(world.context.database, {
    id: world.actors.owner.groupId,
    slug: world.group,
  });
  expect(report.differences).toEqual([]);
}

const everyObject = () => objectRows(world, [...a.entryIds, ...b.entryIds]);
const partsOf = async () => (await everyObject()).map((row) => row.mergedInto);

describe('counting what a policy would do', () => {
  it('tells automatic, left for people and already decided, and changes nothing', async () => {
    await give(entry(a, 0), entry(b, 0), 'unsure');
    const before = await everyObject();
    // Of seven candidates: places 1, 2 and 3 fit; 0 is decided; 4 is too wide; the two of place 5 are rivals.
    expect(await count(RULE)).toEqual({ automatic: 3, toReview: 3, alreadyDecided: 1, conflicts: 0 });
    expect(await count({ ...RULE, noRival: false })).toEqual({
      automatic: 4,
      toReview: 2,
      alreadyDecided: 1,
      conflicts: 0,
    });
    expect(await count({ ...RULE, noRival: false, mutualBest: false, maxSepArcsec: 2 })).toEqual({
      automatic: 6,
      toReview: 0,
      alreadyDecided: 1,
      conflicts: 0,
    });
    expect(await everyObject()).toEqual(before);
    expect((await detail()).policies).toEqual([]);
  });

  it('leaves to people what would join a pair that is kept apart', async () => {
    // A0 = B1 by hand, A0 and A1 kept apart: the policy must not say A1 = B1.
    await give(entry(a, 0), entry(b, 1), 'same');
    await give(entry(a, 0), entry(a, 1), 'different');
    expect(await count(RULE)).toEqual({ automatic: 3, toReview: 4, alreadyDecided: 0, conflicts: 1 });
  });

  it('finds a conflict that two candidates make only together', async () => {
    // A0 = B0 and A1 = B1 would be fine one by one, but B0 = A1 is said and A0 and B1 are kept apart.
    await give(entry(b, 0), entry(a, 1), 'same');
    await give(entry(a, 0), entry(b, 1), 'different');
    expect(await count(RULE)).toMatchObject({ automatic: 3, conflicts: 1 });
  });
});

describe('applying a policy', () => {
  it("gives automatic 'same' verdicts to exactly what was counted, and merges", async () => {
    await give(entry(a, 0), entry(b, 1), 'same');
    await give(entry(a, 0), entry(a, 1), 'different');
    const counted = await count(RULE);
    const jobId = await apply(RULE);
    await runJobs(world);
    const ended = await getJob(world.context, world.actors.owner, jobId);
    expect(ended).toMatchObject({ state: 'done', done: 3, link: `cross-match/${run}` });
    const after = await detail();
    expect(after.verdicts).toEqual({
      same: counted.automatic,
      different: 0,
      unsure: 0,
      undecided: counted.toReview,
      automatic: counted.automatic,
    });
    expect(after.policies).toMatchObject([
      { rule: RULE, verdicts: 3, by: 'Test curator', takenBackAt: null },
    ]);
    expect(await partsOf()).toEqual([
      ...[null, null, null, null, null, null],
      ...[entry(a, 0), entry(a, 0), entry(a, 2), entry(a, 3), null, null, null],
    ]);
    const [candidate] = (
      (await world.agents.reader.get(world.api(`runs/${run}/candidates?verdict=same`))).body as {
        items: { verdict: unknown }[];
      }
    ).items;
    expect(candidate?.verdict).toMatchObject({ origin: 'policy', value: 'same', grade: 'probable' });
    await expectRebuildable();
  });

  it('leaves a later policy nothing that the first has decided', async () => {
    await apply(RULE);
    await apply({ ...RULE, noRival: false });
    await runJobs(world);
    expect((await detail()).policies.map(({ verdicts }) => verdicts)).toEqual([1, 4]);
    await expectRebuildable();
  });

  it('leaves nothing behind when it is cancelled or breaks', async () => {
    const before = await everyObject();
    for (const error of [new JobCancelled(), new Error('the disk is gone')]) {
      const jobId = await apply(RULE);
      await runJob(
        world.context,
        { jobId, groupId: world.actors.owner.groupId },
        {
          ...JOB_KIND_WORK,
          policy: {
            ...JOB_KIND_WORK.policy,
            work: (context, running) =>
              workOnPolicy(context, {
                ...running,
                report: (_done, _total, message) =>
                  message === 'Merging objects' ? Promise.reject(error) : Promise.resolve(),
              }),
          },
        },
      );
    }
    expect(await everyObject()).toEqual(before);
    expect(await detail()).toMatchObject({ policies: [], verdicts: { same: 0, undecided: 7 } });
    const { rows } = await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute(sql`
        select p.id from applied_policy p join match_run r on r.id = p.run_id where r.number = ${run}
        union all select id from verdict where entry_a >= ${entry(a, 0)}`),
    );
    expect(rows).toEqual([]);
  });

  it('does nothing twice when its worker dies between commit and closing', async () => {
    const jobId = await apply(RULE);
    await runJobs(world);
    await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute(sql`update job set state = 'running', finished_at = null where id = ${jobId}`),
    );
    await runJob(world.context, { jobId, groupId: world.actors.owner.groupId }, JOB_KIND_WORK);
    expect((await detail()).policies.map(({ verdicts }) => verdicts)).toEqual([4]);
    expect((await detail()).verdicts.automatic).toBe(4);
  });

  it('bows to a person who says otherwise afterwards', async () => {
    await apply(RULE);
    await runJobs(world);
    const said = await give(entry(a, 0), entry(b, 0), 'different');
    expect(said.objectA).not.toBe(said.objectB);
    expect((await detail()).verdicts).toMatchObject({ same: 3, different: 1, automatic: 3 });
    await takeBackVerdict(world.context, world.actors.curator, said.verdict?.id ?? 0);
    expect((await detail()).verdicts).toMatchObject({ same: 4, different: 0, automatic: 4 });
  });
});

describe('taking a policy back as a whole', () => {
  it('brings back the registry of before, and keeps what people said', async () => {
    const before = (await everyObject()).map((row) => ({ ...row, version: 0 }));
    await apply(RULE);
    await runJobs(world);
    const [policy] = (await detail()).policies;
    await give(entry(a, 0), entry(b, 0), 'unsure');
    const res = await world.agents.curator.delete(world.api(`runs/${run}/policies/${policy?.id}`));
    expect(res.status, res.text).toBe(202);
    await runJobs(world);
    expect((await everyObject()).map((row) => ({ ...row, version: 0 }))).toEqual(before);
    const after = await detail();
    expect(after.verdicts).toEqual({ same: 0, different: 0, unsure: 1, undecided: 6, automatic: 0 });
    expect(after.policies[0]?.takenBackAt).not.toBeNull();
    await expectRebuildable();
    const again = await world.agents.curator.delete(world.api(`runs/${run}/policies/${policy?.id}`));
    expect(again.status).toBe(409);
    expect(again.body).toMatchObject({ code: 'already-taken-back' });
    // Undoing the person's verdict does not bring the withdrawn one back.
    const [candidate] = await verdictIds();
    await takeBackVerdict(world.context, world.actors.curator, candidate ?? 0);
    expect((await detail()).verdicts.undecided).toBe(7);
  });

  async function verdictIds(): Promise<number[]> {
    const { rows } = await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute<{ id: number }>(
        sql`select verdict_id as id from verdict_in_force where entry_a >= ${entry(a, 0)}`,
      ),
    );
    return rows.map(({ id }) => id);
  }
});

describe('who may apply policies, and to what', () => {
  it('refuses strangers, contributors, other groups and foreign policies', async () => {
    await apply(RULE);
    await runJobs(world);
    const [policy] = (await detail()).policies;
    const calls = [
      (who: 'nobody' | 'contributor' | 'foreign', at: (below: string) => string) =>
        world.agents[who].post(at(`runs/${run}/policy/count`), RULE),
      (who: 'nobody' | 'contributor' | 'foreign', at: (below: string) => string) =>
        world.agents[who].post(at(`runs/${run}/policies`), RULE),
      (who: 'nobody' | 'contributor' | 'foreign', at: (below: string) => string) =>
        world.agents[who].delete(at(`runs/${run}/policies/${policy?.id}`)),
    ];
    const here = (below: string) => world.api(below);
    const elsewhere = (below: string) => `/api/groups/${world.foreignGroup}/${below}`;
    for (const call of calls) {
      expect((await call('nobody', here)).status).toBe(401);
      expect((await call('contributor', here)).status).toBe(403);
      expect((await call('foreign', here)).status).toBe(404);
      expect((await call('foreign', elsewhere)).status).toBe(404);
    }
    const other = await world.agents.curator.delete(world.api(`runs/${run}/policies/999`));
    expect(other.status).toBe(404);
  });

  it.each([
    ['maxSepArcsec', { maxSepArcsec: 0 }],
    ['mutualBest', { mutualBest: 'yes' }],
    ['noRival', { noRival: null }],
    ['grade', { grade: 'sure' }],
    ['a field nobody knows', { colour: 'red' }],
  ])('refuses a bad %s', async (_field, bad) => {
    const res = await world.agents.curator.post(world.api(`runs/${run}/policies`), { ...RULE, ...bad });
    expect(res.status).toBe(400);
    expect(res.body).toMatchObject({ code: 'bad-request' });
  });

  it('asks to wait for a run that has not ended and for objects that are not registered', async () => {
    const waiting = await createRun(world.context, world.actors.curator, {
      catalogues: [a.label, b.label],
      radiusArcsec: 1,
      title: '',
    });
    const early = await world.agents.curator.post(world.api(`runs/${waiting.run}/policies`), RULE);
    expect(early.status).toBe(409);
    expect(early.body).toMatchObject({ code: 'not-ready' });
    await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute(sql`update catalogue_revision set registered_at = null where id = ${b.revisionId}`),
    );
    const unregistered = await world.agents.curator.post(world.api(`runs/${run}/policy/count`), RULE);
    expect(unregistered.body).toMatchObject({ status: 409, code: 'not-ready' });
  });
});
