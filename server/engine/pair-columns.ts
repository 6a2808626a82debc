/** Pairs as columns: row `a[i]` of the first catalogue, row `b[i]` of the second, their separation. */
export interface PairColumns {
  readonly a: Uint32Array;
  readonly b: Uint32Array;
  readonly sepArcsec: Float64Array;
}

/** The join found more pairs than the caller allowed. `count` is the number reached when it stopped. */
export class TooManyPairs extends Error {
  override readonly name = 'TooManyPairs';
  readonly count: number;
  readonly maxPairs: number;

  constructor(count: number, maxPairs: number) {
    super(`more than ${maxPairs} pairs (${count} when the join stopped)`);
    this.count = count;
    this.maxPairs = maxPairs;
  }
}

/** A growing list of pairs that the join writes into. */
export interface PairBuffer {
  a: Uint32Array;
  b: Uint32Array;
  sepArcsec: Float64Array;
  length: number;
}

export function createPairBuffer(capacity: number): PairBuffer {
  return {
    a: new Uint32Array(capacity),
    b: new Uint32Array(capacity),
    sepArcsec: new Float64Array(capacity),
    length: 0,
  };
}

/** Doubles the room of a full buffer. */
export function growPairBuffer(buffer: PairBuffer): void {
  const larger = createPairBuffer(Math.max(1024, buffer.a.length * 2));
  larger.a.set(buffer.a);
  larger.b.set(buffer.b);
  larger.sepArcsec.set(buffer.sepArcsec);
  buffer.a = larger.a;
  buffer.b = larger.b;
  buffer.sepArcsec = larger.sepArcsec;
}

/** Copies the pairs out of a buffer and empties it. */
export function takePairs(buffer: PairBuffer): PairColumns {
  const { length } = buffer;
  buffer.length = 0;
  return {
    a: buffer.a.slice(0, length),
    b: buffer.b.slice(0, length),
    sepArcsec: buffer.sepArcsec.slice(0, length),
  };
}

/** One list of pairs from many, in their order. */
export function concatPairs(parts: readonly PairColumns[]): PairColumns {
  const total = parts.reduce((sum, part) => sum + part.a.length, 0);
  const all = createPairBuffer(total);
  for (const part of parts) {
    all.a.set(part.a, all.length);
    all.b.set(part.b, all.length);
    all.sepArcsec.set(part.sepArcsec, all.length);
    all.length += part.a.length;
  }
  return { a: all.a, b: all.b, sepArcsec: all.sepArcsec };
}
