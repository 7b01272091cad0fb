import { saveBlob } from "./save-blob.ts";

/** Hands a text to the reader as a file. */
export function saveText(fileName: string, text: string, type = "text/csv;charset=utf-8"): void {
  saveBlob(fileName, new Blob([text], { type }));
}
