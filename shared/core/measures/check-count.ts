/**
 * Refuses what cannot be a count.
 * @throws RangeError naming `name` for anything but a whole number >= 0
 */
export function checkCount(name: string, value: number): void {
  if (!Number.isSafeInteger(value) || value < 0) {
    throw new RangeError(`${name} must be a whole number >= 0`);
  }
}
