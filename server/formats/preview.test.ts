import { describe, expect, it } from 'vitest';
import { mappingPreview, type ColumnMapping } from '../../shared/schemas/mapping';
import { COMMA, LIMITS, opener } from './fixtures/streams';
import { previewMapping } from './preview';

const mapping: ColumnMapping = {
  position: { kind: 'two-columns', raColumn: 1, decColumn: 2, raNotation: 'degrees', decNotation: 'degrees' },
  keyColumn: 0,
  names: [{ column: 0, separator: null }],
  error: null,
  properMotion: null,
  photometry: [{ column: 3, errorColumn: null, kind: 'magnitude', band: 'V', unit: 'mag' }],
  redshift: null,
};

const preview = async (text: string, limit?: number) =>
  mappingPreview.parse(
    await previewMapping(opener(text), COMMA, mapping, limit === undefined ? LIMITS : { ...LIMITS, limit }),
  );

describe('preview of a mapping', () => {
  it('gives the first rows as they will be understood, each its own', async () => {
    const { rows, setAside } = await preview(
      `id,ra,dec,V\n${Array.from({ length: 50 }, (_, i) => `A ${i},${i}.5,1,${i}`).join('\n')}\n`,
    );
    expect(rows).toHaveLength(20);
    expect(rows.map(({ key, raDeg, photometry }) => [key, raDeg, photometry[0]?.value]).slice(0, 3)).toEqual([
      ['A 0', 0.5, 0],
      ['A 1', 1.5, 1],
      ['A 2', 2.5, 2],
    ]);
    expect(rows[0]?.line).toBe(2);
    expect(setAside).toEqual([]);
  });

  it('finds refusals far below the first rows, ragged rows and repeated keys among them', async () => {
    const good = Array.from({ length: 4000 }, (_, i) => `A ${i},1.5,1,9`).join('\n');
    const { rows, setAside } = await preview(
      `id,ra,dec,V\n${good}\nB 1,400,1,9\nB 2,1,1\nA 7,1,1,9\n"B 3"x,1,1,9\n`,
      5,
    );
    expect(rows).toHaveLength(5);
    expect(setAside.map(({ line, code }) => [line, code])).toEqual([
      [4002, 'ra-out-of-range'],
      [4003, 'too-few-cells'],
      [4004, 'duplicate-key'],
      [4005, 'bad-quoting'],
    ]);
    expect(setAside[2]).toMatchObject({
      column: 'id',
      message: 'The key “A 7” stands in line 9 already.',
      raw: 'A 7,1,1,9',
    });
  });

  it('refuses a mapping that names columns beyond the table', async () => {
    await expect(preview('id,ra\n1,2\n')).rejects.toThrow(RangeError);
  });
});
