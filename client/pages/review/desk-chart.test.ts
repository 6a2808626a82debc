import { describe, expect, it } from 'vitest';
import type { Candidate, DeskTask } from '../../../shared/schemas/run';
import { chartRadiusArcsec, chartSources, seqOfSource } from './desk-chart';

const side = (entryId: number): Candidate['a'] => ({
  catalogue: 'LAN-O',
  ordinal: 0,
  entryId,
  rowNo: entryId,
  designation: `source ${entryId}`,
  raDeg: 10,
  decDeg: 0,
  errMajArcsec: 0.1,
  errMinArcsec: 0.1,
  errPaDeg: 0,
  objectNumber: entryId,
});

const candidate = (seq: number, a: number, b: number): Candidate => ({
  seq,
  a: side(a),
  b: side(b),
  sepArcsec: 1,
  paDeg: 0,
  rankA: 1,
  rankB: 1,
  rivalsA: 0,
  rivalsB: 0,
  mutualBest: true,
  verdict: null,
});

const field = (...entryIds: number[]): DeskTask['field'] =>
  entryIds.map((entryId) => ({ ...side(entryId), pmRaMasYr: 3, pmDecMasYr: null }));

describe('the field of a candidate', () => {
  it('tells the pair, other candidates of either, and the rest apart', () => {
    const sources = chartSources({
      candidate: candidate(1, 10, 20),
      others: [candidate(4, 10, 21), candidate(5, 11, 20)],
      field: field(10, 20, 11, 21, 99),
    });
    expect(sources.map(({ id, emphasis }) => [id, emphasis])).toEqual([
      [10, 'a'],
      [20, 'b'],
      [11, 'member'],
      [21, 'member'],
      [99, 'neighbour'],
    ]);
    expect(sources[0]?.pmRaMasYr).toBe(3);
  });

  it('draws the pair even where the field was cut off before it', () => {
    const sources = chartSources({ candidate: candidate(1, 10, 20), others: [], field: field(20, 99) });
    expect(sources.map(({ id, emphasis }) => [id, emphasis])).toEqual([
      [10, 'a'],
      [20, 'b'],
      [99, 'neighbour'],
    ]);
  });

  it('opens the closest other candidate of a chosen source, and none for a mere neighbour', () => {
    const others = [candidate(4, 10, 21), candidate(7, 12, 21)];
    expect(seqOfSource(others, 21)).toBe(4);
    expect(seqOfSource(others, 12)).toBe(7);
    expect(seqOfSource(others, 99)).toBeNull();
  });

  it('begins at twice the radius of the run, within what was loaded', () => {
    expect(chartRadiusArcsec(10, 2)).toBe(4);
    expect(chartRadiusArcsec(5400, 3600)).toBe(5400);
  });
});
