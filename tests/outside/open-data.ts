import { readFileSync } from 'node:fs';
import { gunzipSync } from 'node:zlib';
import { expect } from 'vitest';
import { coneJoin } from '../../server/engine/cone-join';
import type { PairColumns } from '../../server/engine/pair-columns';
import { rankPairs } from '../../server/engine/pair-ranks';
import type { PositionColumns } from '../../server/engine/positions';
import type { AngleResult } from '../../shared/astro/angles';

/** A small reader of the open data in tests/outside/data: no quotes, one kind of separator, a header. */
export function readTable(path: string, separator: string): Record<string, string>[] {
  const text = gunzipSync(readFileSync(new URL(`./data/${path}`, import.meta.url))).toString('utf8');
  const [header = '', ...lines] = text.split(/\r?\n/).filter((line) => line !== '');
  const names = header.split(separator);
  return lines.map((line) => {
    const cells = line.split(separator);
    return Object.fromEntries(names.map((name, column) => [name, cells[column] ?? '']));
  });
}

export function readJson(path: string): unknown {
  return JSON.parse(readFileSync(new URL(`./data/${path}`, import.meta.url), 'utf8'));
}

export function degreesOf(result: AngleResult): number {
  if (!result.ok) throw new RangeError(result.message);
  return result.deg;
}

export interface NamedPositions extends PositionColumns {
  readonly names: readonly string[];
}

export function namedPositions(
  rows: readonly { name: string; raDeg: number; decDeg: number }[],
): NamedPositions {
  return {
    names: rows.map(({ name }) => name),
    raDeg: Float64Array.from(rows, ({ raDeg }) => raDeg),
    decDeg: Float64Array.from(rows, ({ decDeg }) => decDeg),
  };
}

/** Known pairs by name. */
export class Truth {
  readonly #pairs: ReadonlySet<string>;
  readonly #known: ReadonlySet<string>;

  constructor(pairs: readonly (readonly [string, string])[]) {
    this.#pairs = new Set(pairs.map(([left, right]) => `${left}|${right}`));
    this.#known = new Set(pairs.flatMap(([left, right]) => [`left ${left}`, `right ${right}`]));
  }

  holds(left: string, right: string): boolean {
    return this.#pairs.has(`${left}|${right}`);
  }

  /** True when the truth says something about one of the two rows. */
  knows(left: string, right: string): boolean {
    return this.#known.has(`left ${left}`) || this.#known.has(`right ${right}`);
  }
}

export interface JoinCounts {
  pairs: number;
  truePairs: number;
  mutualNearest: number;
  mutualTrue: number;
  mutualWrong: number;
  mutualUnknown: number;
  /** Rows of either side with two equally near nearest partners: which of them is "the" nearest is a matter of taste. */
  tiedRows: number;
}

/** Joins two catalogues and counts the pairs as the README beside the data says. */
export function countJoin(
  left: NamedPositions,
  right: NamedPositions,
  truth: Truth,
  radiusArcsec: number,
): JoinCounts {
  const pairs: PairColumns = coneJoin(left, right, radiusArcsec);
  const { mutualBest } = rankPairs(pairs, left.names.length, right.names.length);
  const counts: JoinCounts = {
    pairs: 0,
    truePairs: 0,
    mutualNearest: 0,
    mutualTrue: 0,
    mutualWrong: 0,
    mutualUnknown: 0,
    tiedRows: tiedRows(pairs.a, pairs.sepArcsec) + tiedRows(pairs.b, pairs.sepArcsec),
  };
  pairs.a.forEach((row, pair) => {
    const names = [left.names[row] ?? '', right.names[pairs.b[pair] ?? -1] ?? ''] as const;
    const isTrue = truth.holds(...names);
    counts.pairs += 1;
    if (isTrue) counts.truePairs += 1;
    if (mutualBest[pair] !== 1) return;
    counts.mutualNearest += 1;
    if (isTrue) counts.mutualTrue += 1;
    else if (truth.knows(...names)) counts.mutualWrong += 1;
    else counts.mutualUnknown += 1;
  });
  return counts;
}

function tiedRows(rows: Uint32Array, sepArcsec: Float64Array): number {
  const nearest = new Map<number, { sep: number; count: number }>();
  rows.forEach((row, pair) => {
    const sep = sepArcsec[pair] ?? NaN;
    const known = nearest.get(row);
    if (!known || sep < known.sep) nearest.set(row, { sep, count: 1 });
    else if (sep === known.sep) known.count += 1;
  });
  return [...nearest.values()].filter(({ count }) => count > 1).length;
}

/**
 * Equal but for pairs at the very edge of the radius and, in mutual counts, rows with two equally near partners (as
 * stated; counted here where the file does not state them).
 */
export function expectCounts(
  counts: JoinCounts,
  expected: Readonly<Record<string, number>>,
  names: readonly (keyof JoinCounts)[],
): void {
  const { edge = 0, tiedRows: ties = counts.tiedRows } = expected;
  for (const name of names) {
    const allowed = name.startsWith('mutual') ? edge + ties : edge;
    expect(expected[name], name).toBeTypeOf('number');
    expect(
      Math.abs((counts[name] ?? NaN) - (expected[name] ?? NaN)),
      `${name}: ${counts[name]}`,
    ).toBeLessThanOrEqual(allowed);
  }
}
