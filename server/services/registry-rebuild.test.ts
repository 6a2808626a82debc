import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { partitionEntries } from '../engine/partition';
import { rebuildRegistry, type LoggedVerdict } from './registry-rebuild';

const ENTRIES = 9;

/** A log of verdicts and takings-back; a step that names nothing to take back is left out. */
const logs = fc
  .array(
    fc.record({
      entries: fc.uniqueArray(fc.integer({ min: 1, max: ENTRIES }), { minLength: 2, maxLength: 2 }),
      value: fc.constantFrom('same', 'same', 'same', 'different', 'unsure', null),
      which: fc.nat(),
    }),
    { maxLength: 40 },
  )
  .map((steps) => {
    const log: LoggedVerdict[] = [];
    const standing: LoggedVerdict[] = [];
    for (const { entries, value, which } of steps) {
      const [entryA = 0, entryB = 0] = [...entries].sort((x, y) => x - y);
      const id = log.length + 1;
      if (value !== null) {
        const given: LoggedVerdict = { id, entryA, entryB, value, takesBack: null };
        log.push(given);
        standing.push(given);
      } else if (standing.length > 0) {
        const [taken] = standing.splice(which % standing.length, 1);
        if (taken !== undefined) log.push({ ...taken, id, value: null, takesBack: taken.id });
      }
    }
    return log;
  });

const canonical = (components: Iterable<Iterable<number>>) =>
  [...components]
    .map((members) => [...members].sort((x, y) => x - y))
    .filter((members) => members.length > 1)
    .sort((x, y) => (x[0] ?? 0) - (y[0] ?? 0));

describe('the identity rule, written twice', () => {
  it('gives the same components and the same refusals as the engine, for any log', () => {
    fc.assert(
      fc.property(logs, (log) => {
        const { inForce, componentOf, refused } = rebuildRegistry(log);
        const ordered = [...inForce.values()].sort((x, y) => x.id - y.id);
        const same = ordered.filter(({ value }) => value === 'same');
        const different = ordered.filter(({ value }) => value === 'different');
        const pairOf = ({ entryA, entryB }: LoggedVerdict): [number, number] => [entryA, entryB];
        const engine = partitionEntries({ same: same.map(pairOf), different: different.map(pairOf) });
        expect(canonical(new Set(componentOf.values()))).toEqual(canonical(engine.components));
        expect(refused).toEqual(engine.refused.map(({ index }) => same[index]?.id));
      }),
      { numRuns: 2000 },
    );
  });

  it('takes the latest verdict that was not taken back', () => {
    const verdict = (id: number, value: LoggedVerdict['value'], takesBack: number | null = null) => ({
      id,
      entryA: 1,
      entryB: 2,
      value,
      takesBack,
    });
    const log = [verdict(1, 'same'), verdict(2, 'different'), verdict(3, 'unsure'), verdict(4, null, 3)];
    expect(rebuildRegistry(log).inForce.get('1 2')?.id).toBe(2);
    expect(rebuildRegistry([...log, verdict(5, null, 2)]).componentOf.get(2)).toEqual(new Set([1, 2]));
    expect(rebuildRegistry([...log, verdict(5, null, 2), verdict(6, null, 1)]).inForce.size).toBe(0);
  });
});
