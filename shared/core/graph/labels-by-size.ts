import type { Components } from "./components.ts";

/**
 * Renumbers groups by size descending, in place. Groups of one size keep their order, so groups
 * found by smallest person stay so.
 *
 * @param component label of each person's group, 0 … found − 1
 * @param foundSizes people in each group; only the first `found` are read
 *
 * Cost: O(n). Source: methods C.6.1 (order of groups).
 */
export function labelsBySize(
  component: Int32Array,
  foundSizes: Int32Array,
  found: number,
): Components {
  let largest = 0;
  for (let g = 0; g < found; g++) if (foundSizes[g]! > largest) largest = foundSizes[g]!;
  const starts = new Int32Array(largest + 2);
  for (let g = 0; g < found; g++) starts[largest - foundSizes[g]! + 1]!++;
  for (let s = 1; s < starts.length; s++) starts[s]! += starts[s - 1]!;
  const label = new Int32Array(found);
  const sizes = new Int32Array(found);
  for (let g = 0; g < found; g++) {
    const size = foundSizes[g]!;
    const place = starts[largest - size]!++;
    label[g] = place;
    sizes[place] = size;
  }
  for (let u = 0; u < component.length; u++) component[u] = label[component[u]!]!;
  return { component, sizes };
}
