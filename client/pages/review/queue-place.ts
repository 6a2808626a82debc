/** The candidate that an address names; null when it names none (then the first of the queue is meant). */
export function seqOfSearch(search: URLSearchParams): number | null {
  const seq = Number(search.get('seq') ?? NaN);
  return Number.isInteger(seq) && seq > 0 ? seq : null;
}

/** The same address at another candidate; null: at the first of the queue. */
export function withSeq(search: URLSearchParams, seq: number | null): URLSearchParams {
  const after = new URLSearchParams(search);
  if (seq === null) after.delete('seq');
  else after.set('seq', String(seq));
  return after;
}

/** Where a verdict leads: on in the queue, to its first one (what was skipped), or nowhere. */
export type Onward = { kind: 'candidate'; seq: number } | { kind: 'first' } | { kind: 'stay' };

/**
 * Where to go after a verdict. At the end of a queue of undecided candidates the ones that were skipped come next;
 * a queue of decided ones would only begin anew, so there the desk stays.
 */
export function onwardFrom(nextSeq: number | null, queueOf: string): Onward {
  if (nextSeq !== null) return { kind: 'candidate', seq: nextSeq };
  return queueOf === 'undecided' ? { kind: 'first' } : { kind: 'stay' };
}
