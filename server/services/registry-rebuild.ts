/**
 * The identity rule once more, written plainly and apart from engine/partition, for checking the registry:
 * nothing here is shared with the code that writes it.
 */

/** A row of the verdict log. */
export interface LoggedVerdict {
  id: number;
  entryA: number;
  entryB: number;
  value: 'same' | 'different' | 'unsure' | null;
  takesBack: number | null;
}

export interface Rebuilt {
  /** Verdict in force by pair 'a b' (a < b). */
  inForce: Map<string, LoggedVerdict>;
  /** The component of every entry that a carried-out 'same' verdict joins with another. */
  componentOf: Map<number, Set<number>>;
  /** Ids of 'same' verdicts in force that are not carried out. */
  refused: number[];
}

/** Rebuilds from the log, in the order of its ids, what is in force and which entries are one object. */
export function rebuildRegistry(log: readonly LoggedVerdict[]): Rebuilt {
  const inForce = latestNotTakenBack(log);
  const byId = [...inForce.values()].sort((x, y) => x.id - y.id);
  const enemies = new Map<number, number[]>();
  for (const { entryA, entryB, value } of byId) {
    if (value !== 'different') continue;
    enemies.set(entryA, [...(enemies.get(entryA) ?? []), entryB]);
    enemies.set(entryB, [...(enemies.get(entryB) ?? []), entryA]);
  }
  const componentOf = new Map<number, Set<number>>();
  const refused: number[] = [];
  for (const { id, entryA, entryB, value } of byId) {
    if (value !== 'same') continue;
    const a = componentOf.get(entryA) ?? new Set([entryA]);
    const b = componentOf.get(entryB) ?? new Set([entryB]);
    if (a.has(entryB)) continue;
    const [small, large] = a.size <= b.size ? [a, b] : [b, a];
    if ([...small].some((entry) => (enemies.get(entry) ?? []).some((enemy) => large.has(enemy)))) {
      refused.push(id);
      continue;
    }
    for (const entry of small) large.add(entry);
    for (const entry of small) componentOf.set(entry, large);
    componentOf.set(entryA, large);
    componentOf.set(entryB, large);
  }
  return { inForce, componentOf, refused };
}

function latestNotTakenBack(log: readonly LoggedVerdict[]): Map<string, LoggedVerdict> {
  const takenBack = new Set(log.flatMap(({ takesBack }) => (takesBack === null ? [] : [takesBack])));
  const inForce = new Map<string, LoggedVerdict>();
  for (const row of [...log].sort((x, y) => x.id - y.id)) {
    if (row.value !== null && !takenBack.has(row.id)) inForce.set(`${row.entryA} ${row.entryB}`, row);
  }
  return inForce;
}
