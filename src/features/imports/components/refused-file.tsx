import { Notice } from "../../../components/ui/notice.tsx";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { fieldWords } from "../../../lib/field-words.ts";
import { placeOfError } from "../import-words.ts";

export type RefusedFileProps = { error: Error };

/** Why a file as a whole could not be read, by place; what it holds is never repeated. */
export function RefusedFile({ error }: RefusedFileProps) {
  const errors = error instanceof ApiError ? error.errors : [];
  return (
    <Notice tone="error" title="The file was not taken." className="mt-4">
      {errors.length === 0 ? `${errorWords(error)}.` : "Nothing of it was kept."}
      {errors.length > 0 ? (
        <ul className="mt-1 list-disc ps-5">
          {errors.map(({ path, code }) => (
            <li key={`${path} ${code}`}>
              {placeOfError(path)}: {fieldWords(code)}
            </li>
          ))}
        </ul>
      ) : null}
    </Notice>
  );
}
