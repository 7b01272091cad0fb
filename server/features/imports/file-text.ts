import { invalid } from "../../http/problem.ts";

const SLICE_BYTES = 64 * 1024;

/** First bytes of files that are not text whatever their name says. */
const OTHER_FORMATS: readonly (readonly number[])[] = [
  [0x50, 0x4b, 0x03, 0x04], // zip, also spreadsheets
  [0x50, 0x4b, 0x05, 0x06], // empty zip
  [0x1f, 0x8b], // gzip
  [0x25, 0x50, 0x44, 0x46], // PDF
  [0xd0, 0xcf, 0x11, 0xe0], // older office files
];

/**
 * Refuses what cannot be a text file, by its content alone; the name counts for nothing.
 *
 * @throws HttpProblem 422 at path `file`: `empty_file` or `not_csv`
 */
export function refuseOtherFormats(bytes: Buffer): void {
  if (bytes.length === 0) throw invalid({ path: "file", code: "empty_file" });
  if (OTHER_FORMATS.some((magic) => magic.every((byte, at) => bytes[at] === byte))) {
    throw invalid({ path: "file", code: "not_csv" });
  }
}

/**
 * The file as text, slice by slice, with a turn of the event loop after each. A byte-order mark is
 * dropped and every line end becomes a line feed, so that line numbers hold in mixed files.
 *
 * @throws HttpProblem 422 at path `file`: `encoding` when a byte is not UTF-8
 */
export async function* fileText(bytes: Buffer): AsyncGenerator<string> {
  const decoder = new TextDecoder("utf-8", { fatal: true });
  let held = "";
  for (let from = 0; from < bytes.length; from += SLICE_BYTES) {
    const last = from + SLICE_BYTES >= bytes.length;
    let text: string;
    try {
      text = held + decoder.decode(bytes.subarray(from, from + SLICE_BYTES), { stream: !last });
    } catch {
      throw invalid({ path: "file", code: "encoding" });
    }
    // A carriage return at the end of a slice may be half of a line end.
    held = !last && text.endsWith("\r") ? "\r" : "";
    if (held) text = text.slice(0, -1);
    yield text.replace(/\r\n?/g, "\n");
    await new Promise((resolve) => setImmediate(resolve));
  }
}
