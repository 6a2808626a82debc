import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { partitionEntries, type IdPair, type Verdicts } from './partition';

/** The rule in its plainest form: relabel everything at each step. */
function plainly({ same, different }: Verdicts): { components: number[][]; refused: number[] } {
  const ids = new Set([...same, ...different].flat());
  const labels = new Map([...ids].map((id) => [id, id]));
  const refused: number[] = [];
  same.forEach(([a, b], index) => {
    const [from, to] = [labels.get(a), labels.get(b)];
    if (from === to) return;
    const joined = new Map(
      [...labels].map(([id, label]) => [id, label === from ? to : label] as [number, number]),
    );
    if (different.some(([x, y]) => joined.get(x) === joined.get(y))) refused.push(index);
    else joined.forEach((label, id) => labels.set(id, label));
  });
  const groups = new Map<number, number[]>();
  for (const id of [...ids].sort((x, y) => x - y)) {
    const label = labels.get(id) ?? id;
    groups.set(label, [...(groups.get(label) ?? []), id]);
  }
  return { components: [...groups.values()].sort((x, y) => (x[0] ?? 0) - (y[0] ?? 0)), refused };
}

const key = (a: number, b: number) => (a < b ? `${a}-${b}` : `${b}-${a}`);

describe('partitionEntries', () => {
  it('joins what is the same and keeps apart what is not', () => {
    const { components, refused } = partitionEntries({
      same: [
        [1, 2],
        [4, 5],
        [2, 3],
      ],
      different: [[1, 4]],
    });
    expect(components).toEqual([
      [1, 2, 3],
      [4, 5],
    ]);
    expect(refused).toEqual([]);
  });

  it('refuses the pair that would close a forbidden chain, and tells the chain', () => {
    const { components, refused } = partitionEntries({
      same: [
        [10, 20],
        [30, 40],
        [40, 50],
        [20, 30],
      ],
      different: [
        [7, 8],
        [50, 10],
      ],
    });
    expect(components).toEqual([[7], [8], [10, 20], [30, 40, 50]]);
    expect(refused).toEqual([
      { index: 3, edge: [20, 30], forbiddenIndex: 1, forbidden: [50, 10], chain: [50, 40, 30, 20, 10] },
    ]);
  });

  it('the order of the verdicts decides which of two pairs is refused', () => {
    const different: IdPair[] = [[1, 3]];
    const one = partitionEntries({ same: [[1, 2], [2, 3]], different }); // prettier-ignore
    const two = partitionEntries({ same: [[2, 3], [1, 2]], different }); // prettier-ignore
    expect(one.components).toEqual([[1, 2], [3]]);
    expect(two.components).toEqual([[1], [2, 3]]);
    expect([one.refused[0]?.edge, two.refused[0]?.edge]).toEqual([[2, 3], [1, 2]]); // prettier-ignore
  });

  it('a pair that is said to be both is refused by itself', () => {
    const { refused } = partitionEntries({ same: [[5, 6]], different: [[6, 5]] });
    expect(refused).toEqual([
      { index: 0, edge: [5, 6], forbiddenIndex: 0, forbidden: [6, 5], chain: [6, 5] },
    ]);
  });

  it('takes ids up to 2^53 and no ids at all', () => {
    const large = Number.MAX_SAFE_INTEGER;
    expect(partitionEntries({ same: [[large, -3]], different: [] }).components).toEqual([[-3, large]]);
    expect(partitionEntries({ same: [], different: [] })).toEqual({ components: [], refused: [] });
  });

  it('refuses what is not an id', () => {
    expect(() => partitionEntries({ same: [[1, 1.5]], different: [] })).toThrow(RangeError);
    expect(() => partitionEntries({ same: [], different: [[1, NaN]] })).toThrow(RangeError);
    expect(() => partitionEntries({ same: [[2, 2]], different: [] })).toThrow(
      new RangeError('same[0] pairs id 2 with itself'),
    );
  });

  it('does what the rule in its plainest form does', () => {
    const id = fc.integer({ min: 1, max: 12 });
    const pair = fc.tuple(id, id).filter(([a, b]) => a !== b);
    const verdicts = fc.record({
      same: fc.array(pair, { maxLength: 25 }),
      different: fc.array(pair, { maxLength: 8 }),
    });
    fc.assert(
      fc.property(verdicts, (given) => {
        const { components, refused } = partitionEntries(given);
        const plain = plainly(given);
        expect(components).toEqual(plain.components);
        expect(refused.map(({ index }) => index)).toEqual(plain.refused);
        for (const { index, edge, forbiddenIndex, forbidden, chain } of refused) {
          expect(edge).toBe(given.same[index]);
          expect(forbidden).toBe(given.different[forbiddenIndex]);
          expect([chain[0], chain.at(-1)]).toEqual([...forbidden]);
          const said = new Set(given.same.slice(0, index + 1).map(([a, b]) => key(a, b)));
          const steps = chain.slice(1).map((to, at) => key(chain[at] ?? 0, to));
          expect(steps.filter((step) => !said.has(step))).toEqual([]);
          expect(steps).toContain(key(...edge));
        }
      }),
      { numRuns: 400 },
    );
  });

  it('copes with 200,000 pairs, half of them in one long chain', () => {
    const half = 100_000;
    const same = Array.from({ length: half }, (_, i): IdPair => [i + 1, i]);
    for (let i = 0; i < half; i += 1) same.push([10 * half + 2 * i, 10 * half + 2 * i + 1]);
    const { components } = partitionEntries({ same, different: [[-1, 0]] });
    expect(components).toHaveLength(half + 2);
    expect(components[1]).toHaveLength(half + 1);
  });
});
