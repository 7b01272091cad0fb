/** Sum of the parts of a task `paths`: ordered pairs of people by distance, one place per person. */
export function sumDistances(n: number, parts: readonly Float64Array[]): Float64Array {
  const counts = new Float64Array(n);
  for (const part of parts) {
    for (let d = 0; d < n; d++) counts[d] = (counts[d] ?? 0) + (part[d] ?? 0);
  }
  return counts;
}
