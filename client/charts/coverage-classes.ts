import type { CoverageCell } from './sky-projection';

/** Bounds of at most `most` classes of counts, each holding counts >= its bound; the first bound is 1. */
export function countClasses(cells: readonly CoverageCell[], most: number): number[] {
  const top = cells.reduce((high, cell) => Math.max(high, cell.count), 0);
  if (top <= 1) return [1];
  const bounds = Array.from({ length: most }, (_, i) => Math.max(1, Math.round((top + 1) ** (i / most))));
  return [...new Set(bounds)];
}

/** Opacity of the class of this index: the densest is nearly solid. */
export function classOpacity(index: number, classes: number): number {
  return classes <= 1 ? 0.7 : 0.16 + (0.74 * index) / (classes - 1);
}
