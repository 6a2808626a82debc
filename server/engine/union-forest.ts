/**
 * Union-find that remembers by which pairs components were joined, so that the chain between any two members can be
 * told. Besides the usual (compressed) tree it keeps a second one, of the joining pairs, that is never compressed.
 */
export interface Forest {
  readonly size: number;
  /** The representative of the component of a node. */
  rootOf(node: number): number;
  /** Joins the components of two nodes by this pair; returns the new representative. */
  join(one: number, two: number): number;
  /** Nodes on the path between two nodes of one component, both ends included. Throws RangeError for others. */
  pathBetween(from: number, to: number): number[];
}

export function createForest(size: number): Forest {
  const parent = new Int32Array(size);
  for (let node = 0; node < size; node += 1) parent[node] = node;
  const members = new Int32Array(size).fill(1);
  // The pairs that joined, as a tree of nodes: `above` is the neighbour towards the top.
  const above = new Int32Array(size).fill(-1);

  const rootOf = (node: number): number => {
    let root = node;
    while (parent[root] !== root) root = parent[root] as number;
    for (let at = node; at !== root;) {
      const next = parent[at] as number;
      parent[at] = root;
      at = next;
    }
    return root;
  };

  /** Turns the tree of a node upside down, so that the node is its top. Cheap: it is done to the smaller tree. */
  const makeTop = (node: number): void => {
    let at = node;
    let newAbove = -1;
    while (at >= 0) {
      const oldAbove = above[at] as number;
      above[at] = newAbove;
      newAbove = at;
      at = oldAbove;
    }
  };

  const join = (one: number, two: number): number => {
    const rootOne = rootOf(one);
    const rootTwo = rootOf(two);
    if (rootOne === rootTwo) return rootOne;
    const oneIsSmaller = (members[rootOne] as number) < (members[rootTwo] as number);
    const small = oneIsSmaller ? one : two;
    const smallRoot = oneIsSmaller ? rootOne : rootTwo;
    const largeRoot = oneIsSmaller ? rootTwo : rootOne;
    makeTop(small);
    above[small] = oneIsSmaller ? two : one;
    parent[smallRoot] = largeRoot;
    members[largeRoot] = (members[largeRoot] as number) + (members[smallRoot] as number);
    return largeRoot;
  };

  const pathToTop = (node: number): number[] => {
    const path = [node];
    for (let at = above[node] as number; at >= 0; at = above[at] as number) path.push(at);
    return path;
  };

  const pathBetween = (from: number, to: number): number[] => {
    if (rootOf(from) !== rootOf(to)) throw new RangeError(`nodes ${from} and ${to} are not in one component`);
    const up = pathToTop(from);
    const down = pathToTop(to);
    while (up.length > 1 && down.length > 1 && up.at(-2) === down.at(-2)) {
      up.pop();
      down.pop();
    }
    // Both lists end with the node where the paths meet.
    return [...up, ...down.slice(0, -1).reverse()];
  };

  return { size, rootOf, join, pathBetween };
}
