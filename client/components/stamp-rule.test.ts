import { describe, expect, it } from 'vitest';
import { STAMP_SHAPES, stampLetters, stampOf, stampPath } from './stamp-rule';

describe('stamps', () => {
  it('follow the order of arrival: shape by four, hue by seven', () => {
    expect([0, 1, 2, 3, 4, 7].map(stampOf)).toEqual([
      { shape: 'circle', hue: 0 },
      { shape: 'square', hue: 1 },
      { shape: 'diamond', hue: 2 },
      { shape: 'hexagon', hue: 3 },
      { shape: 'circle', hue: 4 },
      { shape: 'hexagon', hue: 0 },
    ]);
  });

  it('differ for the first 28 catalogues of a group', () => {
    const all = Array.from({ length: 28 }, (_, ordinal) => JSON.stringify(stampOf(ordinal)));
    expect(new Set(all).size).toBe(28);
    expect(stampOf(28)).toEqual(stampOf(0));
  });

  it('take one or two letters of the label', () => {
    expect(['LAN-O', 'LAN-NIR', 'Deep', 'X', 'FU_2', 'a.b.c', 'Ωmega'].map(stampLetters)).toEqual([
      'LO',
      'LN',
      'De',
      'X',
      'F2',
      'ac',
      'Ωm',
    ]);
    expect(stampLetters('--')).toBe('?');
  });

  it('have four closed outlines', () => {
    const paths = STAMP_SHAPES.map((shape) => stampPath(shape, 10));
    expect(new Set(paths).size).toBe(4);
    expect(paths.every((path) => path.startsWith('M') && path.endsWith('Z'))).toBe(true);
  });
});
