/** Element of an array that must be there; a hole is a fault of the generator, not of its input. */
export function itemAt<T>(items: ArrayLike<T>, index: number): T {
  const item = items[index];
  if (item === undefined) throw new RangeError(`no element ${index}`);
  return item;
}
