import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { inTransaction } from '../../db/client';
import { candidatePage, deskTask, runDetail, type Candidate, type RunDetail } from '../../shared/schemas/run';
import { separationArcsec } from '../../shared/astro/sphere';
import { giveVerdict } from '../../server/services/verdicts';
import { addCatalogue, runJobs, type FixtureCatalogue, type FixtureSource } from '../support/fixtures';
import { createWorld, type Agent, type World } from '../support/world';

let world: World;
let optical: FixtureCatalogue;

const ARCSEC = 1 / 3600;
const COLUMNS = ['mag'];

/** Five places: a clear pair across RA 0, a clear pair at the pole, a crowded place, and one source alone in each. */
const OPTICAL: FixtureSource[] = [
  { raDeg: 359.99999, decDeg: 0, errArcsec: 0.25, designation: 'OPT-1', cells: ['17.3'] },
  { raDeg: 45, decDeg: 89.9999, errArcsec: 0.25, designation: 'OPT-2', cells: ['18'] },
  { raDeg: 120, decDeg: -30, errArcsec: 0.25, designation: 'OPT-3', cells: ['19'] },
  { raDeg: 120, decDeg: -30 + 1 * ARCSEC, errArcsec: 0.25, designation: 'OPT-4', cells: ['20'] },
  { raDeg: 200, decDeg: 10, errArcsec: 0.25, designation: 'OPT-5', cells: ['21'] },
];
const RADIO: FixtureSource[] = [
  { raDeg: 0.00001, decDeg: 0, errArcsec: 0.5, designation: 'RAD-1', cells: ['a'] },
  { raDeg: 225, decDeg: 89.9999, errArcsec: 0.5, designation: 'RAD-2', cells: ['b'] },
  { raDeg: 120, decDeg: -30 + 0.4 * ARCSEC, errArcsec: 0.5, designation: 'RAD-3', cells: ['c'] },
  { raDeg: 300, decDeg: 10, errArcsec: 0.5, designation: 'RAD-4', cells: ['d'] },
];
const XRAY: FixtureSource[] = [
  { raDeg: 120, decDeg: -30 + 1.9 * ARCSEC, errArcsec: 1, designation: 'XRA-1', cells: [''] },
];

beforeAll(async () => {
  world = await createWorld();
  optical = await addCatalogue(world, { label: 'OPT', sources: OPTICAL, columns: COLUMNS });
  await addCatalogue(world, { label: 'RAD', sources: RADIO, columns: COLUMNS });
  await addCatalogue(world, { label: 'XRA', sources: XRAY, columns: COLUMNS });
});
afterAll(() => world.close());

async function startRun(catalogues: string[], radiusArcsec: number): Promise<{ run: number; jobId: string }> {
  const res = await world.agents.curator.post(world.api('runs'), { catalogues, radiusArcsec });
  expect(res.status, res.text).toBe(202);
  return res.body as { run: number; jobId: string };
}

async function finishedRun(catalogues: string[], radiusArcsec: number): Promise<RunDetail> {
  const { run } = await startRun(catalogues, radiusArcsec);
  await runJobs(world);
  return detail(run);
}

async function detail(run: number): Promise<RunDetail> {
  const res = await world.agents.reader.get(world.api(`runs/${run}`));
  expect(res.status, res.text).toBe(200);
  return runDetail.parse(res.body);
}

async function candidatesOf(run: number, query = ''): Promise<Candidate[]> {
  const res = await world.agents.reader.get(world.api(`runs/${run}/candidates${query}`));
  expect(res.status, res.text).toBe(200);
  return candidatePage.parse(res.body).items;
}

const names = (candidates: Candidate[]) => candidates.map(({ a, b }) => `${a.designation} ${b.designation}`);

describe('a cross-match of three catalogues', () => {
  let run: RunDetail;
  let all: Candidate[];
  beforeAll(async () => {
    run = await finishedRun(['OPT', 'RAD', 'XRA'], 2);
    all = await candidatesOf(run.run);
  });

  it('finds every pair within the radius once, across RA 0, at the pole and between each two catalogues', () => {
    expect(names(all).sort()).toEqual([
      'OPT-1 RAD-1',
      'OPT-2 RAD-2',
      'OPT-3 RAD-3',
      'OPT-3 XRA-1',
      'OPT-4 RAD-3',
      'OPT-4 XRA-1',
      'RAD-3 XRA-1',
    ]);
  });

  it('lists them by separation, each with the separation of its positions', () => {
    const separations = all.map(({ sepArcsec }) => sepArcsec);
    expect(separations).toEqual([...separations].sort((x, y) => x - y));
    expect(all.map(({ seq }) => seq)).toEqual([1, 2, 3, 4, 5, 6, 7]);
    for (const { a, b, sepArcsec } of all) {
      expect(sepArcsec).toBeCloseTo(separationArcsec(a.raDeg, a.decDeg, b.raDeg, b.decDeg), 9);
    }
  });

  it('tells position angle, ranks, rivals and objects of both sides', () => {
    const byName = new Map(all.map((candidate) => [names([candidate])[0], candidate]));
    // East of north by construction: RAD-1 lies due east of OPT-1, RAD-3 due north of OPT-3 and south of OPT-4.
    expect(byName.get('OPT-1 RAD-1')).toMatchObject({
      rankA: 1,
      rankB: 1,
      rivalsA: 0,
      rivalsB: 0,
      mutualBest: true,
    });
    expect(byName.get('OPT-1 RAD-1')?.paDeg).toBeCloseTo(90, 6);
    expect(byName.get('OPT-3 RAD-3')).toMatchObject({
      rankA: 1,
      rankB: 1,
      rivalsA: 0,
      rivalsB: 1,
      mutualBest: true,
    });
    expect(byName.get('OPT-3 RAD-3')?.paDeg).toBeCloseTo(0, 6);
    expect(byName.get('OPT-4 RAD-3')).toMatchObject({
      rankA: 1,
      rankB: 2,
      rivalsA: 0,
      rivalsB: 1,
      mutualBest: false,
    });
    expect(byName.get('OPT-4 RAD-3')?.paDeg).toBeCloseTo(180, 6);
    expect(byName.get('OPT-1 RAD-1')?.a).toEqual({
      catalogue: 'OPT',
      ordinal: 0,
      entryId: optical.entryIds[0],
      rowNo: 1,
      designation: 'OPT-1',
      raDeg: 359.99999,
      decDeg: 0,
      errMajArcsec: 0.25,
      errMinArcsec: 0.25,
      errPaDeg: 0,
      objectNumber: optical.numbers[0],
    });
  });

  it('counts for each pair of catalogues', () => {
    expect(run).toMatchObject({ state: 'done', candidates: 7, radiusArcsec: 2, title: 'OPT × RAD × XRA' });
    expect(run.softwareVersion).toMatch(/^\d+\.\d+\.\d+/);
    expect(run.verdicts).toEqual({ same: 0, different: 0, unsure: 0, undecided: 7, automatic: 0 });
    expect(run.catalogues.map(({ label, sources, revision }) => [label, sources, revision])).toEqual([
      ['OPT', 5, 1],
      ['RAD', 4, 1],
      ['XRA', 1, 1],
    ]);
    expect(run.pairs.map(({ a, b, candidates }) => [a, b, candidates])).toEqual([
      ['OPT', 'RAD', 4],
      ['OPT', 'XRA', 2],
      ['RAD', 'XRA', 1],
    ]);
    const [first] = run.pairs;
    expect(first).toMatchObject({
      mutualBest: 3,
      crowded: 2,
      sourcesAWithCandidate: 4,
      sourcesBWithCandidate: 3,
    });
    // Mutual-best separations by hand: 0.4" (crowded place), 0.072" (RA 0) and 0.72" (two arms of 0.36" at the pole).
    expect(first?.medianSepArcsec).toBeCloseTo(0.4, 6);
    expect(first?.histogram.counts.reduce((sum, count) => sum + count, 0)).toBe(4);
    expect(first?.histogram.edgesArcsec).toHaveLength(41);
    expect(first?.histogram.edgesArcsec.at(-1)).toBe(2);
    // Five and four sources 3 arcmin away from each other's places: no chance pair.
    expect(first?.chancePairs).toBe(0);
  });

  it('measures the shift between two catalogues', async () => {
    const places = Array.from({ length: 21 }, (_, i) => ({ raDeg: 80 + i * 0.01, decDeg: 60 }));
    await addCatalogue(world, { label: 'HERE', sources: places });
    const moved = places.map(({ raDeg }) => ({ raDeg: raDeg - 0.3 * ARCSEC * 2, decDeg: 60 + 0.2 * ARCSEC }));
    await addCatalogue(world, { label: 'THERE', sources: moved });
    const [pair] = (await finishedRun(['HERE', 'THERE'], 3)).pairs;
    // cos 60° = 1/2, so 0.6" of RA is 0.3" on the sky.
    expect(pair?.medianOffsetEastArcsec).toBeCloseTo(-0.3, 5);
    expect(pair?.medianOffsetNorthArcsec).toBeCloseTo(0.2, 5);
  });

  it('pages by keyset in both directions', async () => {
    for (const sort of ['sep', 'sep-desc']) {
      const seen: number[] = [];
      let after = '';
      do {
        const res = await world.agents.reader.get(
          world.api(`runs/${run.run}/candidates?limit=3&sort=${sort}${after}`),
        );
        const page = candidatePage.parse(res.body);
        expect(page.total).toBe(7);
        seen.push(...page.items.map(({ seq }) => seq));
        after = page.next === null ? '' : `&after=${page.next}`;
      } while (after !== '');
      expect(seen).toEqual(sort === 'sep' ? [1, 2, 3, 4, 5, 6, 7] : [7, 6, 5, 4, 3, 2, 1]);
    }
  });

  it('filters by kind, separation, catalogues and verdict', async () => {
    expect(names(await candidatesOf(run.run, '?kind=clear'))).toEqual([
      'OPT-1 RAD-1',
      'OPT-2 RAD-2',
      'RAD-3 XRA-1',
    ]);
    expect(await candidatesOf(run.run, '?kind=crowded')).toHaveLength(4);
    expect(names(await candidatesOf(run.run, '?pair=rad,opt&maxSepArcsec=0.5'))).toEqual([
      'OPT-1 RAD-1',
      'OPT-3 RAD-3',
    ]);
    expect(names(await candidatesOf(run.run, '?minSepArcsec=1.6'))).toEqual(['OPT-3 XRA-1']);
    const [clear] = await candidatesOf(run.run, '?kind=clear&limit=1');
    await giveVerdict(world.context, world.actors.contributor, {
      entryA: clear?.b.entryId ?? 0,
      entryB: clear?.a.entryId ?? 0,
      value: 'different',
      grade: 'possible',
      flags: ['variable'],
      remark: 'moves',
      run: run.run,
    });
    const [decided] = await candidatesOf(run.run, '?verdict=different');
    expect(decided).toMatchObject({
      seq: clear?.seq,
      verdict: {
        value: 'different',
        grade: 'possible',
        flags: ['variable'],
        remark: 'moves',
        by: 'Test contributor',
        origin: 'person',
      },
    });
    expect(await candidatesOf(run.run, '?verdict=undecided')).toHaveLength(6);
    expect(await candidatesOf(run.run, '?verdict=same')).toHaveLength(0);
    expect((await detail(run.run)).verdicts).toMatchObject({ different: 1, undecided: 6 });
  });

  it.each([
    '?limit=0',
    '?sort=name',
    '?after=zzz',
    '?pair=OPT',
    '?pair=OPT,NONE',
    '?verdict=maybe',
    '?colour=red',
  ])('refuses %s', async (query) => {
    const res = await world.agents.reader.get(world.api(`runs/${run.run}/candidates${query}`));
    expect(res.status).toBe(400);
    expect(res.body).toMatchObject({ code: 'bad-request' });
  });

  it('gives the desk everything about one candidate', async () => {
    const crowded = all.find((candidate) => names([candidate])[0] === 'OPT-3 RAD-3');
    const res = await world.agents.reader.get(
      world.api(`runs/${run.run}/candidates/${crowded?.seq}?verdict=undecided`),
    );
    expect(res.status, res.text).toBe(200);
    const task = deskTask.parse(res.body);
    expect(task.candidate).toEqual(crowded);
    expect(names(task.others)).toEqual(['OPT-4 RAD-3', 'RAD-3 XRA-1', 'OPT-3 XRA-1']);
    expect(task.rowA).toEqual([
      { name: 'name', cell: 'OPT-3' },
      { name: 'ra', cell: '120' },
      { name: 'dec', cell: '-30' },
      { name: 'err', cell: '0.25' },
      { name: 'mag', cell: '19' },
    ]);
    expect(task.rowB.at(-1)).toEqual({ name: 'mag', cell: 'c' });
    expect(task.fieldRadiusArcsec).toBe(10);
    expect(task.field.map(({ designation }) => designation).sort()).toEqual([
      'OPT-3',
      'OPT-4',
      'RAD-3',
      'XRA-1',
    ]);
    expect(task.past).toEqual([]);
    // The clear pair at RA 0 (the first) was decided above; nothing undecided lies before.
    expect(task).toMatchObject({ previousSeq: null, nextSeq: (crowded?.seq ?? 0) + 1, undecidedLeft: 6 });
  });

  it('tells the desk what was said before, and turns the queue round with the sort', async () => {
    const [first] = all;
    const url = world.api(`runs/${run.run}/candidates/${first?.seq}?sort=sep-desc`);
    const task = deskTask.parse((await world.agents.reader.get(url)).body);
    expect(task.past).toMatchObject([{ value: 'different', takenBack: false }]);
    expect(task).toMatchObject({ previousSeq: 2, nextSeq: null });
    expect((await world.agents.reader.get(world.api(`runs/${run.run}/candidates/99`))).status).toBe(404);
  });
});

describe('starting a run', () => {
  const post = (agent: Agent, body: object) => agent.post(world.api('runs'), body);

  it('refuses strangers, contributors, other groups and foreign runs', async () => {
    const body = { catalogues: ['OPT', 'RAD'], radiusArcsec: 1 };
    expect((await post(world.agents.nobody, body)).status).toBe(401);
    expect((await post(world.agents.contributor, body)).status).toBe(403);
    expect((await post(world.agents.foreign, body)).status).toBe(404);
    expect((await world.agents.foreign.post(`/api/groups/${world.foreignGroup}/runs`, body)).status).toBe(
      404,
    );
    expect((await world.agents.foreign.get(`/api/groups/${world.foreignGroup}/runs/1`)).status).toBe(404);
    expect((await world.agents.foreign.get(`/api/groups/${world.foreignGroup}/runs`)).body).toEqual({
      items: [],
    });
    expect(
      (await world.agents.foreign.get(`/api/groups/${world.foreignGroup}/runs/1/candidates`)).status,
    ).toBe(404);
  });

  it.each([
    ['one catalogue', { catalogues: ['OPT'] }],
    ['a catalogue twice', { catalogues: ['OPT', 'OPT'] }],
    ['a catalogue twice in another spelling', { catalogues: ['OPT', 'opt'] }],
    ['no radius', { radiusArcsec: null }],
    ['a radius that is too small', { radiusArcsec: 0.001 }],
    ['a radius that is too large', { radiusArcsec: 3601 }],
    ['a title that is too long', { title: 'x'.repeat(201) }],
    ['a field nobody knows', { colour: 'red' }],
  ])('refuses %s', async (_what, bad) => {
    const res = await post(world.agents.curator, { catalogues: ['OPT', 'RAD'], radiusArcsec: 1, ...bad });
    expect(res.status).toBe(400);
    expect(res.body).toMatchObject({ code: 'bad-request' });
  });

  it('refuses a catalogue that is missing or not ready', async () => {
    const missing = await post(world.agents.curator, { catalogues: ['OPT', 'NONE'], radiusArcsec: 1 });
    expect(missing.status).toBe(404);
    const waiting = await addCatalogue(world, { label: 'WAIT', sources: [] });
    await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute(sql`update catalogue_revision set state = 'importing' where id = ${waiting.revisionId}`),
    );
    const res = await post(world.agents.curator, { catalogues: ['OPT', 'WAIT'], radiusArcsec: 1 });
    expect(res.status).toBe(409);
    expect(res.body).toMatchObject({ code: 'not-ready' });
  });

  it('numbers runs without gaps or doubles, also ten at once', async () => {
    const started = await Promise.all(Array.from({ length: 10 }, () => startRun(['OPT', 'XRA'], 0.5)));
    const numbers = started.map(({ run }) => run).sort((x, y) => x - y);
    expect(numbers).toEqual(Array.from({ length: 10 }, (_, i) => (numbers[0] ?? 0) + i));
    await runJobs(world);
    const listed = (await world.agents.reader.get(world.api('runs'))).body as {
      items: { run: number; state: string }[];
    };
    expect(listed.items.slice(0, 10).map(({ run, state }) => [run, state])).toEqual(
      [...numbers].reverse().map((run) => [run, 'done']),
    );
  });
});
