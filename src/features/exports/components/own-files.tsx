import type { Export } from "../../../../shared/contracts/exports.ts";
import { Button } from "../../../components/ui/button.tsx";
import { buttonClass } from "../../../components/ui/button-class.ts";
import { Notice } from "../../../components/ui/notice.tsx";
import { Progress } from "../../../components/ui/progress.tsx";
import { inInvestigation } from "../../../lib/api-client.ts";
import { fieldWords } from "../../../lib/field-words.ts";
import { formatCount, formatInstant, formatShare } from "../../../lib/formatters.ts";
import { fileWords, sizeWords } from "../export-words.ts";

export type OwnFilesProps = {
  investigationId: string;
  timeZone: string;
  files: readonly Export[];
  removing: string | undefined;
  onRemove: (one: Export) => void;
};

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

/** What the reader asked for: being made, or to be fetched. */
export function OwnFiles({ investigationId, timeZone, files, removing, onRemove }: OwnFilesProps) {
  return (
    <ul className="max-w-3xl">
      {files.map((one) => (
        <li key={one.id} className="border-t border-rule py-3 last:border-b">
          {one.state === "building" ? (
            <Progress
              label={capital(fileWords(one))}
              value={one.progress}
              max={1}
              detail={one.progress === 0 ? "waiting" : formatShare(one.progress)}
              onCancel={() => onRemove(one)}
              cancelLabel="Cancel"
            />
          ) : one.state === "failed" ? (
            <Notice tone="error" title={`${capital(fileWords(one))}: not made.`}>
              {fieldWords(one.failure ?? "export_failed")}.
            </Notice>
          ) : (
            <div className="flex flex-wrap items-baseline gap-x-4 gap-y-2">
              <div className="min-w-0 flex-1 basis-64">
                <strong>{capital(fileWords(one))}</strong>
                <p className="text-sm text-ink-2">
                  {formatCount(one.rows, "row", "rows")}, {sizeWords(one.bytes)}. To be fetched
                  until {formatInstant(one.expiresAt, timeZone)}, in this role.
                </p>
              </div>
              <a
                href={inInvestigation(investigationId, `exports/${one.id}/file`)}
                download={one.fileName}
                className={buttonClass("primary", "normal")}
              >
                Download<span className="sr-only"> {one.fileName}</span>
              </a>
              <Button pending={removing === one.id} onClick={() => onRemove(one)}>
                Delete<span className="sr-only"> {one.fileName}</span>
              </Button>
            </div>
          )}
        </li>
      ))}
    </ul>
  );
}
