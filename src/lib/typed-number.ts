/** A typed number for a contract; text that is no number is left for the contract to refuse. */
export function typedNumber(text: string): number | string | null {
  const trimmed = text.trim();
  if (trimmed === "") return null;
  const value = Number(trimmed);
  return Number.isFinite(value) ? value : trimmed;
}
