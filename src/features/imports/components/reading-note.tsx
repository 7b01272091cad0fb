import type { ImportReading } from "../../../../shared/contracts/imports.ts";
import { formWords, howWords } from "../import-words.ts";

export type ReadingNoteProps = { reading: ImportReading };

/** How a file was read: encoding, separator, and what each of its columns was taken for. */
export function ReadingNote({ reading }: ReadingNoteProps) {
  return (
    <details className="mb-5 max-w-[70ch] text-sm text-ink-2">
      <summary className="min-h-6 cursor-pointer text-ink">{formWords(reading)}</summary>
      <ol className="mt-2 list-decimal ps-8">
        {reading.columns.map(({ column, how }, at) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: a column is its place
          <li key={at}>
            {column === null ? (
              howWords.left_out
            ) : (
              <>
                <code className="font-sans font-bold text-ink">{column}</code>, {howWords[how]}
              </>
            )}
          </li>
        ))}
      </ol>
      <p className="mt-2">
        To read the file another way, bring it again and change its columns there.
      </p>
    </details>
  );
}
