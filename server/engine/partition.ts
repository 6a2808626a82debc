/**
 * Objects from verdicts: the connected components of the "same" pairs, less what "different" pairs forbid.
 * The identity rule of the product, as a pure function: the same verdicts always give the same partition.
 */
import { createForest, type Forest } from './union-forest';

/** Two entry ids (safe integers). */
export type IdPair = [number, number];

export interface Verdicts {
  /** In the order of the verdicts: an earlier one is carried out first. */
  readonly same: readonly IdPair[];
  readonly different: readonly IdPair[];
}

/** A "same" pair that is not carried out: it would put both ids of a "different" pair into one component. */
export interface RefusedPair {
  /** Place of the pair in `same`, and the pair as given. */
  readonly index: number;
  readonly edge: IdPair;
  /** Place of the forbidding pair in `different` (the first of them, if there are several), and the pair as given. */
  readonly forbiddenIndex: number;
  readonly forbidden: IdPair;
  /**
   * The chain that would join: ids from forbidden[0] to forbidden[1], each "same" as the next one. The refused pair
   * is one of its steps.
   */
  readonly chain: readonly number[];
}

export interface Partition {
  /** Ids of each component, ascending; components by their lowest id. Every id that was mentioned is in one. */
  readonly components: number[][];
  readonly refused: RefusedPair[];
}

/** Throws RangeError for ids that are not safe integers and for an id paired with itself. */
export function partitionEntries({ same, different }: Verdicts): Partition {
  checkPairs('same', same);
  checkPairs('different', different);
  const idOfNode = ascendingIds([same, different]);
  const sameNodes = nodesOf(same, idOfNode);
  const differentNodes = nodesOf(different, idOfNode);
  const forest = createForest(idOfNode.length);
  const forbidden = createForbiddenLists(forest, differentNodes);

  const refusals: { index: number; forbiddenIndex: number }[] = [];
  for (let index = 0; index < same.length; index += 1) {
    const one = sameNodes.a[index] as number;
    const two = sameNodes.b[index] as number;
    const rootOne = forest.rootOf(one);
    const rootTwo = forest.rootOf(two);
    if (rootOne === rootTwo) continue;
    const forbiddenIndex = forbidden.between(rootOne, rootTwo);
    if (forbiddenIndex >= 0) {
      refusals.push({ index, forbiddenIndex });
      continue;
    }
    forbidden.join(rootOne, rootTwo, forest.join(one, two));
  }
  return {
    components: componentsOf(forest, idOfNode),
    refused: refusals.map(({ index, forbiddenIndex }) => {
      const chain = chainOf(forest, sameNodes, index, differentNodes, forbiddenIndex).map(
        (node) => idOfNode[node] ?? NaN,
      );
      return {
        index,
        edge: at(same, index),
        forbiddenIndex,
        forbidden: at(different, forbiddenIndex),
        chain,
      };
    }),
  };
}

interface NodePairs {
  readonly a: Int32Array;
  readonly b: Int32Array;
}

interface NodePairs {
  readonly a: Int32Array;
  readonly b: Int32Array;
}

function at(pairs: readonly IdPair[], index: number): IdPair {
  const pair = pairs[index];
  if (!pair) throw new RangeError(`there is no pair ${index} among ${pairs.length}`);
  return pair;
}

function checkPairs(name: string, pairs: readonly IdPair[]): void {
  pairs.forEach(([one, two], index) => {
    for (const id of [one, two]) {
      if (!Number.isSafeInteger(id))
        throw new RangeError(`${name}[${index}] must hold safe integers, not ${id}`);
    }
    if (one === two) throw new RangeError(`${name}[${index}] pairs id ${one} with itself`);
  });
}

/** Every id once, ascending: its place is its node. Sorting numbers is several times faster than a Map of them. */
function ascendingIds(lists: readonly (readonly IdPair[])[]): Float64Array {
  const all = new Float64Array(lists.reduce((sum, pairs) => sum + 2 * pairs.length, 0));
  let used = 0;
  for (const pairs of lists) {
    for (const [one, two] of pairs) {
      all[used] = one;
      all[used + 1] = two;
      used += 2;
    }
  }
  all.sort();
  let kept = 0;
  for (let place = 0; place < used; place += 1) {
    if (kept > 0 && all[place] === all[kept - 1]) continue;
    all[kept] = all[place] as number;
    kept += 1;
  }
  return all.slice(0, kept);
}

function nodesOf(pairs: readonly IdPair[], idOfNode: Float64Array): NodePairs {
  const nodes = { a: new Int32Array(pairs.length), b: new Int32Array(pairs.length) };
  pairs.forEach(([one, two], index) => {
    nodes.a[index] = nodeOf(one, idOfNode);
    nodes.b[index] = nodeOf(two, idOfNode);
  });
  return nodes;
}

/** Binary search; the id is known to be there. */
function nodeOf(id: number, idOfNode: Float64Array): number {
  let low = 0;
  let high = idOfNode.length - 1;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if ((idOfNode[middle] as number) < id) low = middle + 1;
    else high = middle;
  }
  return low;
}

interface ForbiddenLists {
  /** Place of the first "different" pair between two components given by their roots, or -1. */
  between(rootOne: number, rootTwo: number): number;
  /** Two roots have become one component with the root `joined`. */
  join(rootOne: number, rootTwo: number, joined: number): void;
}

/**
 * For each component the "different" pairs that leave it, as linked lists that are joined at their ends. A question
 * walks through the shorter list only. Link 2i belongs to end a of pair i, link 2i + 1 to end b.
 */
function createForbiddenLists(forest: Forest, { a, b }: NodePairs): ForbiddenLists {
  const head = new Int32Array(forest.size).fill(-1);
  const tail = new Int32Array(forest.size).fill(-1);
  const length = new Int32Array(forest.size);
  const next = new Int32Array(a.length * 2).fill(-1);
  const append = (root: number, first: number, last: number, count: number): void => {
    if (count === 0) return;
    const end = tail[root] as number;
    if (end < 0) head[root] = first;
    else next[end] = first;
    tail[root] = last;
    length[root] = (length[root] as number) + count;
  };
  for (let pair = 0; pair < a.length; pair += 1) {
    append(a[pair] as number, 2 * pair, 2 * pair, 1);
    append(b[pair] as number, 2 * pair + 1, 2 * pair + 1, 1);
  }
  return {
    between(rootOne, rootTwo) {
      const swap = (length[rootOne] as number) > (length[rootTwo] as number);
      const other = swap ? rootOne : rootTwo;
      let first = -1;
      for (let link = head[swap ? rootTwo : rootOne] as number; link >= 0; link = next[link] as number) {
        const pair = link >> 1;
        const farEnd = (link & 1) === 0 ? (b[pair] as number) : (a[pair] as number);
        if (forest.rootOf(farEnd) === other && (first < 0 || pair < first)) first = pair;
      }
      return first;
    },
    join(rootOne, rootTwo, joined) {
      const from = joined === rootOne ? rootTwo : rootOne;
      append(joined, head[from] as number, tail[from] as number, length[from] as number);
    },
  };
}

/** Nodes ascend with their ids, so components and their members come out in order. */
function componentsOf(forest: Forest, idOfNode: Float64Array): number[][] {
  const sizeOfRoot = new Int32Array(forest.size);
  for (let node = 0; node < forest.size; node += 1) {
    const root = forest.rootOf(node);
    sizeOfRoot[root] = (sizeOfRoot[root] as number) + 1;
  }
  const components: number[][] = [];
  const componentOfRoot = new Int32Array(forest.size).fill(-1);
  const filled = new Int32Array(forest.size);
  for (let node = 0; node < forest.size; node += 1) {
    const root = forest.rootOf(node);
    // Arrays of the right size at once: growing a million small ones costs more than all the rest.
    if (componentOfRoot[root] === -1) {
      componentOfRoot[root] = components.push(new Array<number>(sizeOfRoot[root] as number)) - 1;
    }
    const members = components[componentOfRoot[root] as number] as number[];
    members[filled[root] as number] = idOfNode[node] as number;
    filled[root] = (filled[root] as number) + 1;
  }
  return components;
}

/** Nodes from one end of the forbidding pair to the other, through the refused pair. */
function chainOf(
  forest: Forest,
  same: NodePairs,
  refused: number,
  different: NodePairs,
  forbidden: number,
): number[] {
  const start = different.a[forbidden] as number;
  const end = different.b[forbidden] as number;
  const one = same.a[refused] as number;
  const two = same.b[refused] as number;
  // The refused pair would join two trees; which of its ends is on the side of `start` decides the direction.
  const near = forest.rootOf(start) === forest.rootOf(one) ? one : two;
  return [...forest.pathBetween(start, near), ...forest.pathBetween(near === one ? two : one, end)];
}
