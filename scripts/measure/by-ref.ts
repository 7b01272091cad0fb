/** One value per person as an object by reference; any reference is a plain key. */
export function byRef(refs: readonly string[], values: ArrayLike<number>): Record<string, number> {
  return Object.fromEntries(refs.map((ref, person) => [ref, values[person] ?? 0]));
}
