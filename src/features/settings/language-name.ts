/** The name of a language by its tag, in the reader's own language; the tag where none is known. */
export function languageName(tag: string): string {
  try {
    return new Intl.DisplayNames(undefined, { type: "language" }).of(tag) ?? tag;
  } catch {
    return tag;
  }
}
