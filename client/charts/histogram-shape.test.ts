import { describe, expect, it } from 'vitest';
import { checkBins, stepPath, sumBelow } from './histogram-shape';
import { valueAfterKey } from './limit-keys';
import { linearScale } from './scales';

describe('histogram', () => {
  it('draws closed steps from the base line', () => {
    const x = linearScale(0, 2, 0, 200);
    const y = linearScale(0, 10, 100, 0);
    expect(stepPath([0, 1, 2], [5, 10], x, y, 100)).toBe('M0 100V50H100V0H200V100Z');
    expect(stepPath([0, 1, 2], [5, 10], x, y, null)).toBe('M0 50V50H100V0H200');
  });

  it('refuses edges that do not fit the counts', () => {
    expect(() => checkBins([0, 1], [1, 2])).toThrow('2 counts need 3 edges, not 2');
    expect(() => checkBins([0, 1, 1], [1, 2])).toThrow('edges must rise, at index 2');
  });

  it('adds up to a limit, with the share of the bin that it cuts', () => {
    expect(sumBelow([0, 1, 2, 4], [10, 20, 40], 1.5)).toBe(20);
    expect(sumBelow([0, 1, 2, 4], [10, 20, 40], 9)).toBe(70);
    expect(sumBelow([0, 1, 2, 4], [10, 20, 40], -1)).toBe(0);
  });
});

describe('limit handle keys', () => {
  it('moves in small and large steps and stops at the ends', () => {
    expect(valueAfterKey('ArrowRight', false, 1, 0, 5)).toBeCloseTo(1.01, 12);
    expect(valueAfterKey('ArrowLeft', true, 1, 0, 5)).toBeCloseTo(0.9, 12);
    expect(valueAfterKey('PageDown', false, 0.1, 0, 5)).toBe(0);
    expect(valueAfterKey('End', false, 1, 0, 5)).toBe(5);
    expect(valueAfterKey('a', false, 1, 0, 5)).toBeNull();
  });
});
