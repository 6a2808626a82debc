import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { parseDec, parseRa } from '../../shared/astro/angles';
import { separationArcsec } from '../../shared/astro/sphere';
import { countJoin, degreesOf, expectCounts, namedPositions, readJson, readTable, Truth } from './open-data';

/**
 * Two real lists of galaxies, clusters and nebulae. Source and licences: data/deepsky-south/README.md. The expected
 * counts were computed with astropy and SciPy, apart from this project.
 */
const expected = z
  .object({
    alphaRows: z.number(),
    betaRows: z.number(),
    truthPairs: z.number(),
    truthMedianSepArcsec: z.number(),
    byRadiusArcsec: z.record(z.string(), z.record(z.string(), z.number())),
  })
  .parse(readJson('deepsky-south/expected.json'));

const alpha = namedPositions(
  readTable('deepsky-south/alpha.csv.gz', ',').map((row) => ({
    name: row.recno ?? '',
    raDeg: degreesOf(parseRa(row.ra_deg ?? '', 'degrees')),
    decDeg: degreesOf(parseDec(row.dec_deg ?? '', 'degrees')),
  })),
);
const beta = namedPositions(
  readTable('deepsky-south/beta.tsv.gz', '\t').map((row) => ({
    name: row.designation ?? '',
    raDeg: degreesOf(parseRa(row.RAJ2000 ?? '', 'sexagesimal-hours')),
    decDeg: degreesOf(parseDec(row.DEJ2000 ?? '', 'sexagesimal-degrees')),
  })),
);
const truthPairs = readTable('deepsky-south/truth.csv.gz', ',').map(
  (row) => [row.alpha_recno ?? '', row.beta_designation ?? '', Number(row.sep_arcsec)] as const,
);
const truth = new Truth(truthPairs.map(([recno, designation]) => [recno, designation]));

describe('deepsky-south', () => {
  it('is read whole', () => {
    expect([alpha.names.length, beta.names.length, truthPairs.length]).toEqual([
      expected.alphaRows,
      expected.betaRows,
      expected.truthPairs,
    ]);
  });

  it('separations of the true pairs are those of the file, to the rounding of its positions', () => {
    const alphaRow = new Map(alpha.names.map((name, row) => [name, row]));
    const betaRow = new Map(beta.names.map((name, row) => [name, row]));
    const separations = truthPairs.map(([recno, designation, stated]) => {
      const one = alphaRow.get(recno) ?? -1;
      const two = betaRow.get(designation) ?? -1;
      const sep = separationArcsec(
        alpha.raDeg[one] ?? NaN,
        alpha.decDeg[one] ?? NaN,
        beta.raDeg[two] ?? NaN,
        beta.decDeg[two] ?? NaN,
      );
      return { sep, off: Math.abs(sep - stated) };
    });
    // The file has them from positions before these were rounded to 1e-6 deg: half a step on either axis, half a digit.
    const rounding = 0.0018 * Math.SQRT2 + 0.0005;
    expect(separations.filter(({ off }) => !(off <= rounding))).toEqual([]);
    const median = separations.map(({ sep }) => sep).sort((x, y) => x - y)[(truthPairs.length - 1) / 2];
    expect(median).toBeCloseTo(expected.truthMedianSepArcsec, 2);
  });

  it.each(Object.entries(expected.byRadiusArcsec))('%s arcsec', (radius, counts) => {
    expectCounts(countJoin(alpha, beta, truth, Number(radius)), counts, [
      'pairs',
      'truePairs',
      'mutualNearest',
      'mutualTrue',
    ]);
  });
});
