import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { summariseControls } from '../../server/engine/histogram';
import { rankPairs } from '../../server/engine/pair-ranks';
import { healpixCell, healpixCellAreaDeg2, healpixCentre, wideHealpixCell } from '../../shared/astro/healpix';
import { checkValueIds, checkValues, expectAsGiven, numberInput, numbersInput } from './check-values';

describe('HEALPix cells', () => {
  it.each(checkValues('healpix-'))('%s', (_, entry) => {
    const order = numberInput(entry, 'order');
    const place = [numberInput(entry, 'raDeg'), numberInput(entry, 'decDeg')] as const;
    // Entries of high orders give the number as text.
    if (typeof entry.expected.pixel === 'string') {
      expectAsGiven(entry, { pixel: wideHealpixCell(order, ...place).toString() });
    } else {
      expectAsGiven(entry, { pixel: healpixCell(order, ...place) });
    }
    if (order <= 14) expect(BigInt(healpixCell(order, ...place))).toBe(wideHealpixCell(order, ...place));
  });

  it.each(checkValues('hpxcen-'))('%s', (_, entry) => {
    expectAsGiven(entry, { ...healpixCentre(numberInput(entry, 'order'), numberInput(entry, 'pixel')) });
  });

  it.each(checkValues('hpxsize-'))('%s', (_, entry) => {
    const areaDeg2 = healpixCellAreaDeg2(numberInput(entry, 'order'));
    expectAsGiven(entry, { areaDeg2, arcmin: Math.sqrt(areaDeg2) * 60 });
  });
});

describe('pairs', () => {
  it.each(checkValues('mutual-'))('%s', (_, entry) => {
    const table = z.array(z.array(z.number().nullable())).parse(entry.inputs.separationsArcsec);
    const cells = table
      .flatMap((row, a) => row.map((sep, b) => ({ a, b, sep })))
      .filter(({ sep }) => sep !== null);
    const pairs = {
      a: Uint32Array.from(cells, ({ a }) => a),
      b: Uint32Array.from(cells, ({ b }) => b),
      sepArcsec: Float64Array.from(cells, ({ sep }) => sep ?? NaN),
    };
    const { mutualBest } = rankPairs(pairs, table.length, table[0]?.length ?? 0);
    const mutual = cells.filter((_cell, pair) => mutualBest[pair] === 1).map(({ a, b }) => [a, b]);
    expectAsGiven(entry, { pairs: mutual });
  });

  it.each(checkValues('control-'))('%s', (_, entry) => {
    const controls = numbersInput(entry, 'pairsInShiftedFields');
    expectAsGiven(entry, { ...summariseControls(controls, numberInput(entry, 'pairsInRealField')) });
  });
});

it('every check value kept here is run by some test', () => {
  const families =
    /^(sep|meeus|sofa|flat|pa|tan|detan|offset|unit|rahalf|uvmean|rayleigh|rconv|share|rasec|ellipse|cov2ell|errcorr|combine|mahalanobis|normsep|sexa|sexd|sexbad|fmtra|fmtdec|key|healpix|hpxcen|hpxsize|mutual|control)-/;
  expect(checkValueIds.filter((id) => !families.test(id))).toEqual([]);
});
