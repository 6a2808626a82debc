import { describe, expect, it } from 'vitest';
import { controlPairsPerBin, equalEdges, separationHistogram, summariseControls } from './histogram';
import { coneJoin } from './cone-join';
import { samplePair } from './sample-skies';

describe('separationHistogram', () => {
  it('closes bins below, and the last one on both sides', () => {
    const counts = separationHistogram(Float64Array.of(0, 0.5, 1, 1.5, 2, 2.5, 3, 3.1, NaN), [0, 1, 2, 3]);
    expect([...counts]).toEqual([2, 2, 3]);
  });

  it('counts each separation within unequal bins', () => {
    const { a, b } = samplePair('dense', 2000, 5, 21);
    const { sepArcsec } = coneJoin(a, b, 100);
    const edges = [0, 0.1, 3, 3.5, 40, 100];
    const expected = edges
      .slice(1)
      .map(
        (to, bin) =>
          Array.from(sepArcsec).filter(
            (sep) => sep >= (edges[bin] ?? 0) && (to === 100 ? sep <= to : sep < to),
          ).length,
      );
    expect([...separationHistogram(sepArcsec, edges)]).toEqual(expected);
    expect(expected.every((count) => count > 0)).toBe(true);
  });

  it.each([[[0]], [[0, 0]], [[1, 0]], [[0, NaN]]])('refuses edges %j', (edges) => {
    expect(() => separationHistogram(new Float64Array(0), edges)).toThrow(RangeError);
  });

  it('equal edges run from 0 to the radius', () => {
    expect([...equalEdges(2, 4)]).toEqual([0, 0.5, 1, 1.5, 2]);
    expect(() => equalEdges(2, 0)).toThrow(RangeError);
  });
});

describe('controlPairsPerBin', () => {
  const edges = equalEdges(15, 5);

  it('finds the density of unrelated sources, not the true pairs', () => {
    const rows = 40_000;
    const { a, b } = samplePair('uniform', rows, 1, 31);
    const controls = controlPairsPerBin(a, b, 15, edges, { shiftArcsec: 600 });
    // Unrelated sources on the whole sky: rows² pi r² / 4 pi, r in radians. The 24,000 true pairs are all below 1 arcsec.
    const radius = (15 / 3600) * (Math.PI / 180);
    const expected = (rows * rows * radius * radius) / 4;
    const total = controls?.meanPerBin.reduce((sum, count) => sum + count, 0) ?? NaN;
    expect(Math.abs(total - expected)).toBeLessThan(5 * Math.sqrt(expected / 8));
    // Chance pairs grow with the area of the ring: 1, 3, 5, 7, 9 parts of 25.
    controls?.meanPerBin.forEach((count, bin) => {
      const share = (expected * (2 * bin + 1)) / 25;
      expect(Math.abs(count - share)).toBeLessThan(5 * Math.sqrt(share / 8) + 0.3);
    });
  });

  it('averages the eight directions, at the poles too', () => {
    const { a, b } = samplePair('north pole', 3000, 1, 32);
    const controls = controlPairsPerBin(a, b, 15, edges, { shiftArcsec: 120 });
    const all = controls?.pairsPerDirection ?? [];
    expect(all).toHaveLength(8);
    const mean = all.reduce((sum, pairs) => sum + pairs, 0) / 8;
    expect(controls?.meanPerBin.reduce((sum, count) => sum + count, 0)).toBeCloseTo(mean, 9);
    expect(mean).toBeGreaterThan(10);
  });

  it('refuses a shift that leaves true pairs within reach', () => {
    const { a, b } = samplePair('dense', 10, 1, 33);
    expect(() => controlPairsPerBin(a, b, 15, edges, { shiftArcsec: 15 })).toThrow(RangeError);
  });

  it('stops when asked to', () => {
    const { a, b } = samplePair('dense', 100, 1, 34);
    expect(controlPairsPerBin(a, b, 15, edges, { shiftArcsec: 100, shouldStop: () => true })).toBeNull();
  });
});

describe('summariseControls', () => {
  it('has no share of nothing', () => {
    expect(summariseControls([0, 0], 0).falseShare).toBeNull();
    expect(() => summariseControls([], 4)).toThrow(RangeError);
  });
});
