/**
 * A simple undirected graph in compressed sparse rows. The neighbours of person `u` are
 * `neighbours[offsets[u]] … neighbours[offsets[u + 1] - 1]`, ascending and without repeats; each
 * pair stands in both rows, so `neighbours.length === 2 * m`.
 */
export type Graph = {
  /** People, isolates included. */
  readonly n: number;
  /** Distinct contact pairs. */
  readonly m: number;
  readonly offsets: Int32Array;
  readonly neighbours: Int32Array;
};

/** The two ends of each telling of a contact; `a[k]` met `b[k]`. Order and repeats do not matter. */
export type PairEnds = { readonly a: Int32Array; readonly b: Int32Array };

function checkEnds(n: number, ends: PairEnds, length: number): void {
  if (!Number.isSafeInteger(n) || n < 0) throw new RangeError("n must be a whole number >= 0");
  if (
    !Number.isSafeInteger(length) ||
    length < 0 ||
    length > ends.a.length ||
    length > ends.b.length
  ) {
    throw new RangeError("length must lie within both arrays of ends");
  }
  const { a, b } = ends;
  for (let k = 0; k < length; k++) {
    const u = a[k]!;
    const v = b[k]!;
    if (u < 0 || u >= n || v < 0 || v >= n) {
      throw new RangeError(`pair ${k} names a person outside 0 … ${n - 1}`);
    }
    if (u === v) throw new RangeError(`pair ${k} names the same person twice`);
  }
}

/** Turns "how many per row" in `offsets[u + 1]` into row starts, in place. */
function accumulate(offsets: Int32Array): void {
  for (let u = 1; u < offsets.length; u++) offsets[u]! += offsets[u - 1]!;
}

/**
 * Builds the contact graph: one node per person, one link per unordered pair however often it was
 * told. Repeated and reversed pairs collapse; pairs of a person with themselves are refused.
 *
 * Rows come out sorted without a comparison sort: arcs are dropped into rows, then the rows are
 * transposed. A symmetric graph is its own transpose, and walking the source rows in ascending
 * order fills every target row in ascending order.
 *
 * @param n number of people; ends are 0 … n − 1
 * @param ends ends of each telling
 * @param length use only the first `length` tellings (for growing buffers); default all
 * @throws RangeError for an end outside 0 … n − 1, a self pair, or a length beyond the arrays
 *
 * Cost: O(n + tellings) time and memory. Source: methods, "General conventions" of C.
 */
export function buildGraph(n: number, ends: PairEnds, length = ends.a.length): Graph {
  checkEnds(n, ends, length);
  const { a, b } = ends;

  const starts = new Int32Array(n + 1);
  for (let k = 0; k < length; k++) {
    starts[a[k]! + 1]!++;
    starts[b[k]! + 1]!++;
  }
  accumulate(starts);

  const unsorted = new Int32Array(2 * length);
  const cursor = starts.slice(0, n);
  for (let k = 0; k < length; k++) {
    const u = a[k]!;
    const v = b[k]!;
    unsorted[cursor[u]!++] = v;
    unsorted[cursor[v]!++] = u;
  }

  const sorted = new Int32Array(2 * length);
  cursor.set(starts.subarray(0, n));
  for (let u = 0; u < n; u++) {
    const end = starts[u + 1]!;
    for (let k = starts[u]!; k < end; k++) sorted[cursor[unsorted[k]!]!++] = u;
  }

  // Repeats now stand side by side: close the gaps in place.
  const offsets = new Int32Array(n + 1);
  let kept = 0;
  for (let u = 0; u < n; u++) {
    const end = starts[u + 1]!;
    let previous = -1;
    for (let k = starts[u]!; k < end; k++) {
      const v = sorted[k]!;
      if (v !== previous) sorted[kept++] = v;
      previous = v;
    }
    offsets[u + 1] = kept;
  }
  return { n, m: kept / 2, offsets, neighbours: sorted.slice(0, kept) };
}
