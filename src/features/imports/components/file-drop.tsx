import { type DragEvent, useId, useRef, useState } from "react";
import { FieldNotes } from "../../../components/fields/field-frame.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { formatNumber } from "../../../lib/formatters.ts";

export type FileDropProps = {
  label: string;
  file: File | null;
  onFile: (file: File) => void;
  error?: string;
};

function sizeWords(bytes: number): string {
  if (bytes < 1000) return `${formatNumber(bytes)} bytes`;
  return bytes < 1_000_000
    ? `${formatNumber(bytes / 1000)} kB`
    : `${formatNumber(bytes / 1_000_000, { decimals: 1 })} MB`;
}

/** One file, dropped here or chosen with the button; the browser's own input does the work. */
export function FileDrop({ label, file, onFile, error }: FileDropProps) {
  const id = useId();
  const input = useRef<HTMLInputElement>(null);
  const [over, setOver] = useState(false);

  function drop(event: DragEvent) {
    event.preventDefault();
    setOver(false);
    const dropped = event.dataTransfer.files[0];
    if (dropped) onFile(dropped);
  }

  return (
    <div>
      <label htmlFor={id} className="mb-1 block text-sm font-bold">
        {label}
      </label>
      {/* biome-ignore lint/a11y/noStaticElementInteractions: the button inside does the same by keyboard */}
      <div
        className={`flex flex-wrap items-center gap-x-4 gap-y-2 border border-dashed px-4 py-5 ${
          over ? "border-kelp bg-wash" : "border-ink-2"
        }`}
        onDragOver={(event) => {
          event.preventDefault();
          setOver(true);
        }}
        onDragLeave={() => setOver(false)}
        onDrop={drop}
      >
        <input
          ref={input}
          id={id}
          type="file"
          accept=".csv,text/csv"
          className="sr-only"
          tabIndex={-1}
          aria-invalid={error ? true : undefined}
          aria-describedby={error ? `${id}-error` : undefined}
          onChange={(event) => {
            const chosen = event.target.files?.[0];
            if (chosen) onFile(chosen);
            // So that the same file, put right meanwhile, can be chosen again.
            event.target.value = "";
          }}
        />
        <Button onClick={() => input.current?.click()}>
          {file ? "Choose another file" : "Choose a file"}
        </Button>
        <p className="min-w-0 break-words text-ink-2" aria-live="polite">
          {file ? (
            <>
              <bdi className="text-ink">{file.name}</bdi>, {sizeWords(file.size)}
            </>
          ) : (
            "or drop it here"
          )}
        </p>
      </div>
      <FieldNotes id={id} hint={undefined} error={error} />
    </div>
  );
}
