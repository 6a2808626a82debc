const MAX_LOAD = 0.6;
const FIRST_CAPACITY = 1 << 16;

/**
 * Remembers 64-bit fingerprints of keys in 8 to 27 bytes each, whatever the length of the key: tells whether a key
 * may have been seen before. 'No' is certain; a wrong 'yes' needs two keys with the same fingerprint (for ten
 * million keys about 3 in a million runs), so a caller that acts on 'yes' checks it exactly afterwards.
 */
export class KeyFilter {
  #capacity = FIRST_CAPACITY;
  #low = new Uint32Array(FIRST_CAPACITY);
  #high = new Uint32Array(FIRST_CAPACITY);
  #count = 0;

  get size(): number {
    return this.#count;
  }

  /** Adds a key; true when it may have been added before. */
  addAndTest(key: string): boolean {
    let low = 0x811c9dc5;
    let high = 0x9e3779b9;
    for (let i = 0; i < key.length; i += 1) {
      const unit = key.charCodeAt(i);
      low = Math.imul(low ^ unit, 0x01000193);
      high = Math.imul((high << 13) | (high >>> 19), 5) + unit + 0x3c6ef372;
      high = Math.imul(high ^ (high >>> 16), 0x85ebca6b);
    }
    low = scramble(low ^ (high >>> 7));
    high = scramble(high ^ key.length);
    // (0, 0) marks a free place.
    if (low === 0 && high === 0) low = 1;
    if (this.#put(low >>> 0, high >>> 0)) return true;
    if (this.#count > this.#capacity * MAX_LOAD) this.#grow();
    return false;
  }

  #put(low: number, high: number): boolean {
    const mask = this.#capacity - 1;
    let at = (low ^ (high << 1)) & mask;
    for (;;) {
      const l = this.#low[at];
      const h = this.#high[at];
      if (l === 0 && h === 0) {
        this.#low[at] = low;
        this.#high[at] = high;
        this.#count += 1;
        return false;
      }
      if (l === low && h === high) return true;
      at = (at + 1) & mask;
    }
  }

  #grow(): void {
    const low = this.#low;
    const high = this.#high;
    this.#capacity *= 2;
    this.#low = new Uint32Array(this.#capacity);
    this.#high = new Uint32Array(this.#capacity);
    this.#count = 0;
    for (let i = 0; i < low.length; i += 1) {
      const l = low[i] ?? 0;
      const h = high[i] ?? 0;
      if (l !== 0 || h !== 0) this.#put(l, h);
    }
  }
}

/** Finaliser of a 32-bit hash: every input bit reaches every output bit (MurmurHash3's published constants, from memory). */
function scramble(value: number): number {
  let h = value;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return h ^ (h >>> 16);
}
