import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';

/** Contrast by WCAG 2.2 (relative luminance and contrast ratio as defined there). */
const TEXT = 4.5;
/** Borders of controls, signs and lines that carry meaning (success criterion 1.4.11). */
const GRAPHIC = 3;

type Colours = Readonly<Record<string, string>>;

function themes(css: string): Map<string, Colours> {
  const found = new Map<string, Colours>();
  for (const [, selector = '', body = ''] of css.matchAll(/([^{}]+)\{([^{}]*)\}/g)) {
    const name = /data-theme='(\w+)'/.exec(selector)?.[1];
    if (name === undefined) continue;
    const entries = [...body.matchAll(/--([\w-]+):\s*(#[0-9a-f]{6});/gi)].map(
      (m) => [m[1] ?? '', m[2] ?? ''] as const,
    );
    found.set(name, Object.fromEntries(entries));
  }
  return found;
}

function luminance(hex: string): number {
  const [r = NaN, g = NaN, b = NaN] = [1, 3, 5]
    .map((at) => parseInt(hex.slice(at, at + 2), 16) / 255)
    .map((c) => (c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4));
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

function contrast(one: string, other: string): number {
  const [high = NaN, low = NaN] = [luminance(one), luminance(other)].sort((a, b) => b - a);
  return (high + 0.05) / (low + 0.05);
}

const GROUNDS = ['page', 'raised', 'sunken'];
const TEXTS = ['ink', 'muted', 'accent', 'link', 'good', 'warn', 'bad'];
const HUES = [0, 1, 2, 3, 4, 5, 6];

/** [foreground, ground, least ratio] of everything that is drawn on something. */
const PAIRS: readonly (readonly [string, string, number])[] = [
  ...TEXTS.flatMap((text) => GROUNDS.map((ground) => [text, ground, TEXT] as const)),
  ['on-accent', 'accent', TEXT],
  ...GROUNDS.map((ground) => ['edge', ground, GRAPHIC] as const),
  ...GROUNDS.map((ground) => ['stamp-edge', ground, GRAPHIC] as const),
  ...HUES.map((hue) => [`stamp-${hue}-ink`, `stamp-${hue}`, TEXT] as const),
  ...HUES.flatMap((hue) => GROUNDS.map((ground) => [`stamp-${hue}-line`, ground, GRAPHIC] as const)),
];

const css = readFileSync(path.join(import.meta.dirname, 'tokens.css'), 'utf8');
const all = themes(css);

describe('colours of the themes', () => {
  it('reads three themes with the same tokens', () => {
    expect([...all.keys()]).toEqual(['paper', 'night', 'dome']);
    const names = [...all.values()].map((colours) => Object.keys(colours).sort());
    expect(names[1]).toEqual(names[0]);
    expect(names[2]).toEqual(names[0]);
  });

  it('computes the published extremes: black on white is 21, a colour on itself 1', () => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 10);
    expect(contrast('#b93a24', '#b93a24')).toBe(1);
    // #767676 on white is the well-known last grey that passes: 4.54 (from memory).
    expect(contrast('#767676', '#ffffff')).toBeCloseTo(4.54, 2);
  });

  for (const [theme, colours] of all) {
    it(`${theme}: every pair that is used reaches AA`, () => {
      const failing = PAIRS.flatMap(([fore, ground, least]) => {
        const ratio = contrast(colours[fore] ?? '', colours[ground] ?? '');
        return ratio >= least ? [] : [`${fore} on ${ground}: ${ratio.toFixed(2)} < ${least}`];
      });
      expect(failing).toEqual([]);
    });
  }

  it('dome sends hardly any green and blue, and nothing brighter than a dim red', () => {
    for (const [name, hex] of Object.entries(all.get('dome') ?? {})) {
      const [r = NaN, g = NaN, b = NaN] = [1, 3, 5].map((at) => parseInt(hex.slice(at, at + 2), 16));
      expect(luminance(hex), name).toBeLessThan(0.25);
      expect(Math.max(g, b), name).toBeLessThanOrEqual(r * 0.35);
    }
  });
});
