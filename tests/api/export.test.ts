import { parse } from 'csv-parse/sync';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ExportRecipe } from '../../shared/schemas/export';
import { mergedTableCsv } from '../../server/services/merged-table';
import { addCatalogue } from '../support/fixtures';
import { createWorld, type World } from '../support/world';

const RECIPE: ExportRecipe = {
  aliases: 'one-cell',
  position: 'both',
  separations: true,
  grades: true,
  catalogues: [
    { label: 'LEFT', columns: [4] },
    { label: 'RIGHT', columns: [0] },
  ],
  minEntries: 1,
  standingIn: [],
};

describe('the merged table', () => {
  let world: World;
  beforeAll(async () => {
    world = await createWorld();
    const many = Array.from({ length: 4500 }, (_, i) => ({ raDeg: (i * 0.07) % 360, decDeg: -40 + (i % 80), designation: `LEFT ${i + 1}`, cells: [String(i)] }));
    const left = await addCatalogue(world, {
      label: 'LEFT',
      columns: ['remark'],
      sources: [
        { raDeg: 10, decDeg: 20, errArcsec: 1, designation: 'LEFT A', cells: ['=1+1'] },
        { raDeg: 10.0001, decDeg: 20, errArcsec: 1, designation: 'LEFT B', cells: ['say "hi", twice\u0020'] },
        { raDeg: 30, decDeg: -5.5, errArcsec: 1, designation: 'LEFT C', cells: ['-12.3'] },
        ...many,
      ],
    });
    const right = await addCatalogue(world, { label: 'RIGHT', sources: [{ raDeg: 10, decDeg: 20.0001, errArcsec: 1, designation: 'RIGHT Ä' }] });
    const say = (a: number | undefined, b: number | undefined, grade: string) =>
      world.agents.curator.post(world.api('verdicts'), { entryA: a, entryB: b, value: 'same', grade }).expect(201);
    await say(left.entryIds[0], right.entryIds[0], 'certain');
    await say(left.entryIds[1], right.entryIds[0], 'possible');
  });
  afterAll(() => world.close());

  const csv = async (recipe: ExportRecipe) => {
    const answer = await world.agents.reader.get(
      world.api(`exports/merged-table.csv?recipe=${encodeURIComponent(JSON.stringify(recipe))}`),
    );
    expect(answer.headers['content-type']).toContain('text/csv');
    expect(answer.headers['content-disposition']).toContain('attachment');
    return parse<Record<string, string>>(answer.text, { columns: true, record_delimiter: '\r\n' });
  };

  it('has one row for each object, with everything of its sources', async () => {
    const rows = await csv(RECIPE);
    expect(rows).toHaveLength(4502);
    expect(new Set(rows.map((row) => row.object)).size).toBe(4502);
    expect(rows[0]).toMatchObject({
      object: '1',
      name: 'LEFT A',
      entries: '3',
      aliases: 'LEFT A; LEFT B; RIGHT Ä',
      grade: 'possible',
      verdicts: '2',
      'RIGHT.name': 'RIGHT Ä',
    });
    expect(rows[0]?.['LEFT.sep_arcsec']?.split('; ')).toHaveLength(2);
    expect(rows.at(-1)).toMatchObject({ name: 'LEFT 4500', 'LEFT.remark': '4499', grade: '', verdicts: '0' });
  });

  it('makes text safe for spreadsheets and leaves numbers alone', async () => {
    const rows = await csv({ ...RECIPE, minEntries: 1 });
    expect(rows[0]?.['LEFT.remark']).toBe("'=1+1; say \"hi\", twice");
    expect(rows.find((row) => row.name === 'LEFT C')).toMatchObject({ 'LEFT.remark': '-12.3', dec_deg: '-5.5' });
  });

  it('keeps only objects with so many sources, or that stand in a catalogue', async () => {
    expect(await csv({ ...RECIPE, minEntries: 2 })).toHaveLength(1);
    expect(await csv({ ...RECIPE, standingIn: ['RIGHT'] })).toHaveLength(1);
    expect(await csv({ ...RECIPE, standingIn: ['GONE'] })).toHaveLength(0);
  });

  it('gives one name column for each catalogue when asked', async () => {
    const [row] = await csv({ ...RECIPE, aliases: 'per-catalogue', position: 'sexagesimal', minEntries: 2 });
    expect(row).toMatchObject({ 'LEFT.name': 'LEFT A; LEFT B', 'RIGHT.name': 'RIGHT Ä' });
    expect(row?.dec).toMatch(/^\+20:00:00\.\d{3}$/);
    expect(Object.keys(row ?? {})).not.toContain('ra_deg');
  });

  it('shows the same header and first rows in the preview', async () => {
    const answer = await world.agents.reader.get(
      world.api(`exports/preview?recipe=${encodeURIComponent(JSON.stringify(RECIPE))}`),
    );
    expect(answer.body).toMatchObject({ rows: 4502 });
    const { header, sample } = answer.body as { header: string[]; sample: string[][] };
    expect(header.slice(0, 2)).toEqual(['object', 'name']);
    expect(sample).toHaveLength(20);
    const options = await world.agents.reader.get(world.api('exports/options'));
    expect(options.body).toMatchObject({ objects: 4502, catalogues: [{ label: 'LEFT' }, { label: 'RIGHT' }] });
  });

  it('refuses a recipe that is none, with the fields', async () => {
    for (const recipe of ['{', '{"aliases":"x"}', '']) {
      const answer = await world.agents.reader.get(world.api(`exports/preview?recipe=${encodeURIComponent(recipe)}`));
      expect(answer.body).toMatchObject({ status: 400, code: 'bad-request' });
    }
  });

  it('gives its connection back when a reader goes away in the middle', async () => {
    const { pool } = world.context.database;
    for (let i = 0; i < 15; i += 1) {
      const lines = mergedTableCsv(world.context, world.actors.reader, RECIPE);
      await lines.next();
      await lines.return(undefined);
    }
    expect(pool.waitingCount).toBe(0);
    expect(pool.totalCount - pool.idleCount).toBe(0);
  });
});
