/** Pure scale functions: value to pixel and back, and ticks at round values. */

export interface Scale {
  /** Pixel of a value. */
  at(value: number): number;
  /** Value of a pixel. */
  valueAt(pixel: number): number;
}

/** Straight scale from a domain (lo < hi) to pixels; `from` may be larger than `to` (an axis that points up). */
export function linearScale(lo: number, hi: number, from: number, to: number): Scale {
  checkDomain(lo, hi);
  return {
    at: (value) => from + ((value - lo) / (hi - lo)) * (to - from),
    valueAt: (pixel) => lo + ((pixel - from) / (to - from)) * (hi - lo),
  };
}

/** Logarithmic scale; the domain must be positive. Values of zero or less have no place: NaN. */
export function logScale(lo: number, hi: number, from: number, to: number): Scale {
  checkDomain(lo, hi);
  if (!(lo > 0)) throw new RangeError(`the domain of a log scale begins above 0, not at ${lo}`);
  const span = Math.log(hi / lo);
  return {
    at: (value) => (value > 0 ? from + (Math.log(value / lo) / span) * (to - from) : NaN),
    valueAt: (pixel) => lo * Math.exp(((pixel - from) / (to - from)) * span),
  };
}

function checkDomain(lo: number, hi: number): void {
  if (!Number.isFinite(lo) || !Number.isFinite(hi) || !(lo < hi)) {
    throw new RangeError(`a scale needs a finite domain with lo < hi, not ${lo}..${hi}`);
  }
}

/** The round number (1, 2 or 5 times a power of ten) nearest to, and at most, `value`; needs value > 0. */
export function roundDown125(value: number): number {
  if (!(value > 0) || !Number.isFinite(value)) throw new RangeError(`value must be above 0, not ${value}`);
  const power = 10 ** Math.floor(Math.log10(value) + 1e-12);
  const lead = value / power;
  return (lead >= 5 - 1e-9 ? 5 : lead >= 2 - 1e-9 ? 2 : 1) * power;
}

/** The step (1, 2 or 5 times a power of ten) that gives at most about `most` ticks over a range. */
export function tickStep(lo: number, hi: number, most: number): number {
  checkDomain(lo, hi);
  const rough = (hi - lo) / Math.max(1, most);
  const below = roundDown125(rough);
  if (below >= rough * (1 - 1e-9)) return below;
  const lead = Math.round(below / 10 ** Math.floor(Math.log10(below) + 1e-12));
  return below * (lead === 2 ? 2.5 : 2);
}

/** Round values inside lo..hi, rising; at most about `most` of them. */
export function linearTicks(lo: number, hi: number, most = 6): number[] {
  const step = tickStep(lo, hi, most);
  const first = Math.ceil(lo / step - 1e-9);
  const last = Math.floor(hi / step + 1e-9);
  // Built from whole numbers, so that 0.1 + 0.2 never shows; the rounding drops digits beyond the step.
  const digits = Math.max(0, -Math.floor(Math.log10(step) + 1e-12));
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => {
    const value = (first + i) * step;
    return digits > 15 ? value : Number(value.toFixed(digits)) + 0;
  });
}

/** A tick's number with as many decimals as its step needs. */
export function tickText(value: number, step: number): string {
  if (value !== 0 && (Math.abs(value) >= 1e6 || step < 1e-6)) return value.toExponential(1).replace('-', '−');
  const digits = Math.max(0, -Math.floor(Math.log10(step) + 1e-12));
  return value.toFixed(Math.min(12, digits)).replace('-', '−');
}
