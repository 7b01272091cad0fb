/** Connected groups of records under growing pairs; path halving, union by size. */
export interface Groups {
  root(id: number): number;
  join(a: number, b: number): void;
  size(id: number): number;
}

/** Groups over ids 0 .. capacity - 1, each alone at first. */
export function createGroups(capacity: number): Groups {
  const parent = Int32Array.from({ length: capacity }, (_, i) => i);
  const sizes = new Int32Array(capacity).fill(1);
  function root(id: number): number {
    let node = id;
    for (;;) {
      const up = parent[node] ?? node;
      if (up === node) return node;
      parent[node] = parent[up] ?? up;
      node = up;
    }
  }
  return {
    root,
    join(a, b) {
      let big = root(a);
      let small = root(b);
      if (big === small) return;
      if ((sizes[big] ?? 0) < (sizes[small] ?? 0)) [big, small] = [small, big];
      parent[small] = big;
      sizes[big] = (sizes[big] ?? 0) + (sizes[small] ?? 0);
    },
    size: (id) => sizes[root(id)] ?? 0,
  };
}
