/**
 * The stamp of a catalogue: a plain shape and a hue from its order of arrival (0, 1, 2 …), letters from its label.
 * Shape and hue run with different periods, so that the first 28 catalogues of a group all differ.
 */

export const STAMP_SHAPES = ['circle', 'square', 'diamond', 'hexagon'] as const;
export type StampShape = (typeof STAMP_SHAPES)[number];

export const STAMP_HUES = 7;

export interface StampRule {
  shape: StampShape;
  /** Number of the colour token, 0..6: fill `--stamp-N`, letters `--stamp-N-ink`, lines `--stamp-N-line`. */
  hue: number;
}

/** Shape and hue of the catalogue that arrived as number `ordinal`. */
export function stampOf(ordinal: number): StampRule {
  const whole = Number.isFinite(ordinal) ? Math.abs(Math.trunc(ordinal)) : 0;
  return { shape: STAMP_SHAPES[whole % STAMP_SHAPES.length] ?? 'circle', hue: whole % STAMP_HUES };
}

/**
 * One or two letters of a label: the first of its first and of its last part ('LAN-O' gives 'LO'), or the first
 * two signs of a label of one part ('Deep' gives 'De').
 */
export function stampLetters(label: string): string {
  const parts = label.split(/[^\p{L}\p{N}]+/u).filter((part) => part !== '');
  const first = [...(parts[0] ?? '')];
  const last = [...(parts.at(-1) ?? '')];
  const letters = parts.length > 1 ? [first[0], last[0]] : first.slice(0, 2);
  return letters.join('') || '?';
}

/** SVG path of a shape around (0, 0); all shapes look about equally large at the same `radius`. */
export function stampPath(shape: StampShape, radius: number): string {
  const at = (x: number, y: number) => `${round(x * radius)},${round(y * radius)}`;
  switch (shape) {
    case 'circle':
      return `M${at(-1, 0)}a${at(1, 1)} 0 1 0 ${at(2, 0)}a${at(1, 1)} 0 1 0 ${at(-2, 0)}Z`;
    case 'square':
      return `M${at(-0.9, -0.9)}L${at(0.9, -0.9)}L${at(0.9, 0.9)}L${at(-0.9, 0.9)}Z`;
    case 'diamond':
      return `M${at(0, -1.25)}L${at(1.25, 0)}L${at(0, 1.25)}L${at(-1.25, 0)}Z`;
    case 'hexagon':
      return `M${at(-1.1, 0)}L${at(-0.55, -0.95)}L${at(0.55, -0.95)}L${at(1.1, 0)}L${at(0.55, 0.95)}L${at(-0.55, 0.95)}Z`;
  }
}

function round(value: number): number {
  return Math.round(value * 1000) / 1000;
}
