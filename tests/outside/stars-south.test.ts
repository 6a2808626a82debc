import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { parseDec, parseRa } from '../../shared/astro/angles';
import { positionAtTangentOffset } from '../../shared/astro/sphere';
import {
  countJoin,
  degreesOf,
  expectCounts,
  namedPositions,
  readJson,
  readTable,
  Truth,
  type JoinCounts,
  type NamedPositions,
} from './open-data';

/**
 * Three real star lists of one part of the sky. Source and licences: data/stars-south/README.md. The expected counts
 * were computed with astropy, SciPy and NumPy, apart from this project.
 */
const expectedSchema = z.object({
  rows: z.record(z.string(), z.number()),
  truePairs: z.record(z.string(), z.number()),
});
const caseSchema = z.object({ byRadiusArcsec: z.record(z.string(), z.record(z.string(), z.number())) });
const expected = z.record(z.string(), z.unknown()).parse(readJson('stars-south/expected.json'));

const hip = namedPositions(
  readTable('stars-south/hip_j2000.csv.gz', ',').map((row) => ({
    name: row.HIP ?? '',
    raDeg: degreesOf(parseRa(row.ra ?? '', 'degrees')),
    decDeg: degreesOf(parseDec(row.dec ?? '', 'degrees')),
  })),
);

const hdRows = readTable('stars-south/hd_epoch1950.csv.gz', ';').map((row) => ({
  name: row.HD ?? '',
  raDeg: degreesOf(parseRa(row.RA ?? '', 'sexagesimal-hours')),
  decDeg: degreesOf(parseDec(row.Dec ?? '', 'sexagesimal-degrees')),
  pmRa: Number(row.pmRA),
  pmDec: Number(row.pmDE),
}));
const hd = namedPositions(hdRows);
/** Straight motion for 50 years: unit(r0 + t mu) is the point at that offset in the tangent plane of r0. */
const hdMoved = namedPositions(
  hdRows.map(({ pmRa, pmDec, ...from }) => ({
    name: from.name,
    ...positionAtTangentOffset({ xiArcsec: (pmRa * 50) / 1000, etaArcsec: (pmDec * 50) / 1000 }, from),
  })),
);

const hr = namedPositions(
  readTable('stars-south/bright.tsv.gz', '\t').map((row) => ({
    name: (row.HR ?? '').replace(/^HR/, 'HR '),
    raDeg: degreesOf(parseRa(row.RA_hours ?? '', 'hours')),
    decDeg: degreesOf(parseDec(row.Dec_deg ?? '', 'degrees')),
  })),
);

const truthRows = readTable('stars-south/truth.csv.gz', ',');
const truthOf = (pair: string): Truth =>
  new Truth(
    truthRows
      .filter((row) => row.pair === pair)
      .map((row) => [row.left ?? '', row.right?.replace(/^HR ?/, 'HR ') ?? '']),
  );

const COUNTS: readonly (keyof JoinCounts)[] = [
  'pairs',
  'truePairs',
  'mutualNearest',
  'mutualTrue',
  'mutualWrong',
  'mutualUnknown',
];

describe('stars-south', () => {
  it('is read whole', () => {
    const { rows, truePairs } = expectedSchema.parse(expected);
    expect([hip, hd, hr].map(({ names }) => names.length)).toEqual([
      rows.hip_j2000,
      rows.hd_epoch1950,
      rows.bright,
    ]);
    expect(truthRows).toHaveLength(Object.values(truePairs).reduce((sum, count) => sum + count, 0));
  });

  const cases: [string, NamedPositions, NamedPositions, string][] = [
    ['hip x hd, epochs ignored', hip, hd, 'hip-hd'],
    ['hip x hd, hd moved to 2000.0 with its own motions', hip, hdMoved, 'hip-hd'],
    ['hip x hr', hip, hr, 'hip-hr'],
    ['hd x hr, hd moved to 2000.0', hdMoved, hr, 'hd-hr'],
  ];
  describe.each(cases)('%s', (name, left, right, pair) => {
    const truth = truthOf(pair);
    const byRadius = Object.entries(caseSchema.parse(expected[name]).byRadiusArcsec);

    it.each(byRadius)('%s arcsec', (radius, counts) => {
      expectCounts(countJoin(left, right, truth, Number(radius)), counts, COUNTS);
    });
  });
});
