/** One measured figure of `npm run bench`. */
export interface Figure {
  name: string;
  /** What it was measured on. */
  data: string;
  value: number;
  unit: string;
  /** What it is compared with, measured in the same process. */
  baseline: string;
  baselineValue: number;
  /** value / baselineValue. */
  ratio: number;
  /** The goal in words, and whether this run met it. */
  goal: string;
  met: boolean;
  /** How to measure it again. */
  repeat: string;
}
