/** Steps of an arrow key over the whole axis; with Shift ten at once. */
const STEPS = 500;

/** A value after an arrow key, held inside lo..hi; null for other keys. */
export function valueAfterKey(
  key: string,
  fast: boolean,
  value: number,
  lo: number,
  hi: number,
): number | null {
  const step = ((hi - lo) / STEPS) * (fast ? 10 : 1);
  const moved = {
    ArrowRight: value + step,
    ArrowUp: value + step,
    ArrowLeft: value - step,
    ArrowDown: value - step,
    PageUp: value + step * 25,
    PageDown: value - step * 25,
    Home: lo,
    End: hi,
  }[key];
  return moved === undefined ? null : Math.min(hi, Math.max(lo, moved));
}
