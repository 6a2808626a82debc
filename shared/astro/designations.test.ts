import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { GENITIVES, GREEK_CHARACTERS } from './designation-words';
import { nameKey } from './designations';

/** Spellings of one designation each. Common practice, no source; rules in the methods handbook, section 12. */
const SAME: readonly (readonly string[])[] = [
  ['NGC 0224', 'ngc224', 'NGC224', 'N.G.C. 224', 'NGC_224', 'NGC\u00a0224', ' NGC  224 ', 'Ｎｇｃ 224'],
  ['M 31', 'M31', 'Messier 31', 'messier 031', 'M.31'],
  ['HD 1234 A', 'HD 1234A', 'hd1234a', 'HD 01234 A'],
  ['α Cen', 'Alpha Cen', 'alf Cen', 'ALPHA CENTAURI', 'alp Cen', 'αCen', 'Alf. Cen.'],
  ['α¹ Cen', 'alf01 Cen', 'alpha 1 Cen', 'alpha1 Centauri', 'α1 Cen', 'α^1 Cen', 'alpha^1 Cen'],
  ['β UMa', 'beta Ursae Majoris', 'bet UMa'],
  ['ξ UMa', 'xi UMa', 'ksi Ursae Majoris'],
  ['θ Ori C', 'tet Ori C', 'theta Orionis C'],
  ['µ Cep', 'μ Cep', 'mu Cep', 'mu. Cep', 'Mu Cephei'],
  ['ω Cen', 'Omega Centauri', 'ome Cen'],
  ['61 Cyg', '61 Cygni', '61cyg', '61Cyg'],
  ['V335 Sgr', 'V 335 Sgr', 'V0335 Sagittarii'],
  ['R CrB', 'R Coronae Borealis', 'r crb', 'R CRB'],
  ['r Car', 'r Carinae'],
  ['BD+31 4234', 'BD +31°4234', 'BD +31 4234', 'bd+31_4234', 'BD+31° 4234', 'BD+31º4234'],
  ['BD-01 123', 'BD −01 123', 'BD–01 123', 'BD ‑01 123'],
  ['CD-32 1234', 'CoD -32 1234', 'CD−32°1234'],
  ['PKS 1817-43', 'PKS 1817–43', 'PKS1817-43', 'PKS 1817 -43'],
  ['ESO 137-001', 'ESO 137- 1', 'eso 137-1', 'ESO 0137-001'],
  ['MCG -05-23-016', 'MCG-5-23-16', 'MCG −05−23−016'],
  ['3C 273', '3C273', '3 C 273', '3c 0273'],
  ['Mrk 231', 'Markarian 231', 'Mkn 0231'],
  ['SN 1987A', 'SN1987a', 'SN 1987 A'],
  ['HD 189733 b', 'HD 189733b', 'HD189733 b'],
  ['[ABC2001] 12', '[abc2001]12'],
  ['Barnard’s star', "Barnard's Star"],
];

/** Different designations that look alike. */
const DIFFERENT: readonly (readonly string[])[] = [
  ['NGC 224', 'NGC 2240', 'NGC 22', 'IC 224', 'NGC 224A', 'NGC 224-1', 'NGC 2 24'],
  ['HD 1234', 'HD 1234 A', 'HD 1234 B', 'HD 1234 AB', 'HD 12345', 'HD 1234²'],
  ['HD 189733', 'HD 189733 B', 'HD 189733 b'],
  ['r Car', 'R Car', 'RR Car'],
  ['α Cen', 'α¹ Cen', 'α² Cen', 'α Cen A', 'α Cen B', 'α Cnc', 'β Cen'],
  ['o Cen', 'ο Cen', 'ω Cen'],
  ['ε Tau', 'υ Tau', 'τ Eri', 'Tau 1'],
  ['BD+31 4234', 'BD-31 4234', 'BD+31 423', 'BD+314 234', 'BD+3 14234', 'BD+31 4234A', 'CD+31 4234'],
  ['BD-00 12', 'BD+00 12', 'BD-0 12'],
  ['J0034-0721', 'J0034+0721', 'J034-721', 'J0034-072', 'J0034.0-0721', 'J34-721', 'B0034-0721'],
  ['PSR J0034', 'PSR J34'],
  ['PSR B0034', 'PSR B34'],
  ['2E 0102.2-7219', '2E 102.2-7219', '2E 0102-7219', '2E 01022-7219'],
  ['Gaia DR3 0123456789012345678', 'Gaia DR3 123456789012345678', 'Gaia DR2 0123456789012345678'],
  ['XYZ 0123456789', 'XYZ 123456789'],
  ['ESO 137-001', 'ESO 137-010', 'ESO 13-7001'],
  ['MCG -05-23-016', 'MCG +05-23-016', 'MCG -05-23-160'],
  ['4C 03.01', '4C 3.01', '4C 03.1', '4C 0301'],
  ['UGC 09618', 'UGC 09618 NED01', 'UGC 09618 NED02', 'UGC 9618A'],
  ['Gl 411', 'GJ 411'],
  ['SN 1999aa', 'SN 1999A', 'SN 1999ab'],
  ['ABC 12.5', 'ABC 125', 'ABC 12 5', 'ABC 12-5', 'ABC 12+5'],
];

describe('nameKey', () => {
  it.each(SAME.map((spellings) => [spellings[0], spellings] as const))(
    'one key for all spellings of %s',
    (_, all) => {
      expect([...new Set(all.map(nameKey))]).toHaveLength(1);
    },
  );

  it.each(DIFFERENT.map((names) => [names[0], names] as const))(
    '%s shares its key with none of its likes',
    (_, all) => {
      expect(new Set(all.map(nameKey)).size).toBe(all.length);
    },
  );

  it('no two groups of the table share a key', () => {
    const keys = SAME.map(([name]) => nameKey(name ?? ''));
    expect(new Set(keys).size).toBe(SAME.length);
  });

  it('every Greek letter in every constellation has a key of its own', () => {
    const greek = [...GREEK_CHARACTERS.keys()].filter((letter) => letter !== 'ς');
    const keys = greek.flatMap((letter) =>
      [...GENITIVES.keys()].map((genitive) => nameKey(`${letter} ${genitive}`)),
    );
    expect(new Set(keys).size).toBe(24 * 88);
  });

  it('nothing readable gives the empty key', () => {
    for (const text of ['', '   ', '\u0000\u0001\t\n', '\u200b\ufeff', '___', '\ud800'])
      expect(nameKey(text)).toBe('');
  });

  it('copes with a cell of 100,000 characters', () => {
    for (const piece of ['a', '1', 'a ', '1 ', 'α', '.', '-', 'a.', "'"]) {
      expect(typeof nameKey(piece.repeat(100_000))).toBe('string');
    }
  });
});

describe('nameKey, for any text', () => {
  const piece = fc.oneof(
    fc.constantFrom(
      'NGC',
      'HD',
      'alpha',
      'alf',
      'Cen',
      'cygni',
      'ursae',
      'majoris',
      'J',
      'B',
      'MCG',
      'ESO',
      'BD',
      'cod',
    ),
    fc.constantFrom(
      ' ',
      '  ',
      '_',
      '-',
      '−',
      '+',
      '.',
      '0',
      '00',
      '1',
      '12',
      '°',
      '²',
      'α',
      'Σ',
      'ς',
      "'",
      '^',
      'a',
      'B',
    ),
    fc.string({ unit: 'binary', maxLength: 3 }),
  );
  const text = fc.array(piece, { maxLength: 9 }).map((pieces) => pieces.join(''));

  it('is idempotent', () => {
    fc.assert(
      fc.property(text, (name) => {
        const key = nameKey(name);
        expect(nameKey(key)).toBe(key);
      }),
      { numRuns: 3000 },
    );
  });

  it('holds no blanks at its ends, no control characters and no capital letters', () => {
    fc.assert(
      fc.property(text, (name) => {
        const key = nameKey(name);
        expect(key.trim()).toBe(key);
        expect(key).not.toMatch(/[\p{Cc}A-Z_]/u);
      }),
      { numRuns: 1000 },
    );
  });

  it('keeps signs, and digits but for leading zeros', () => {
    const digits = (name: string) => name.replace(/(?<!\d)0+(?=\d)/g, '').replace(/[^\d+-]/g, '');
    const ascii = fc.string({ unit: fc.constantFrom(...'0123456789+-. abcXYZ'), maxLength: 20 });
    fc.assert(
      fc.property(ascii, (name) => {
        expect(digits(nameKey(name))).toBe(digits(name));
      }),
      { numRuns: 2000 },
    );
  });
});
