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

/** How the text of a file is written; without a mark it can only be UTF-8. */
export interface TextForm {
  encoding: "utf-8" | "utf-16le" | "utf-16be";
  /** True when the file begins with a byte-order mark. */
  mark: boolean;
}

const MARKS: readonly [TextForm["encoding"], readonly number[]][] = [
  ["utf-8", [0xef, 0xbb, 0xbf]],
  ["utf-16le", [0xff, 0xfe]],
  ["utf-16be", [0xfe, 0xff]],
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
 * The encoding by the byte-order mark. A file that begins with a NUL in its first characters and
 * has no mark is UTF-16 or UTF-32, and which of them would be a guess.
 *
 * @throws HttpProblem 422 at path `file`: `encoding`
 */
export function textForm(bytes: Buffer): TextForm {
  const marked = MARKS.find(([, mark]) => mark.every((byte, at) => bytes[at] === byte));
  const start = marked ? marked[1].length : 0;
  const wide = marked !== undefined && marked[0] !== "utf-8";
  const nul = (at: number) => bytes[at] === 0;
  // The mark of UTF-32 begins like that of UTF-16 and goes on with two NULs.
  if (wide ? nul(start) && nul(start + 1) : nul(start) || nul(start + 1)) {
    throw invalid({ path: "file", code: "encoding" });
  }
  return { encoding: marked ? marked[0] : "utf-8", mark: marked !== undefined };
}

/** Place of the first character that is none in the encoding, near the slice that failed. */
function badByte(bytes: Buffer, from: number, encoding: TextForm["encoding"]): number {
  let start = Math.max(0, from - 4);
  const inside = (at: number) =>
    encoding === "utf-8"
      ? ((bytes[at] ?? 0) & 0xc0) === 0x80
      : ((bytes[at + (encoding === "utf-16le" ? 1 : 0)] ?? 0) & 0xfc) === 0xdc;
  const unit = encoding === "utf-8" ? 1 : 2;
  while (start >= unit && from - start < 8 && inside(start)) start -= unit;
  const decoder = new TextDecoder(encoding, { fatal: true });
  let begun = start;
  for (let at = start; at < bytes.length; at++) {
    try {
      if (decoder.decode(bytes.subarray(at, at + 1), { stream: true }) !== "") begun = at + 1;
    } catch {
      return begun;
    }
  }
  return begun;
}

/** Where a file cannot be read: its line and the byte, both counted from 1; never what stands there. */
function encodingFault(bytes: Buffer, from: number, { encoding }: TextForm) {
  const at = badByte(bytes, from, encoding);
  const before = new TextDecoder(encoding).decode(bytes.subarray(0, at));
  const line = (before.match(/\r\n?|\n/g)?.length ?? 0) + 1;
  return invalid({ path: `file.line.${line}.byte.${at + 1}`, code: "encoding" });
}

/**
 * The file as text, slice by slice, with a turn of the event loop after each. A byte-order mark is
 * dropped and every line end becomes a line feed, so that line numbers hold in mixed files.
 *
 * @throws HttpProblem 422 `encoding` at path `file.line.N.byte.N` when bytes do not fit the encoding
 */
export async function* fileText(bytes: Buffer, form: TextForm): AsyncGenerator<string> {
  const decoder = new TextDecoder(form.encoding, { fatal: true });
  let held = "";
  for (let from = 0; from < bytes.length; from += SLICE_BYTES) {
    const last = from + SLICE_BYTES >= bytes.length;
    let text: string;
    try {
      text = held + decoder.decode(bytes.subarray(from, from + SLICE_BYTES), { stream: !last });
    } catch {
      throw encodingFault(bytes, from, form);
    }
    // A carriage return at the end of a slice may be half of a line end.
    held = !last && text.endsWith("\r") ? "\r" : "";
    if (held) text = text.slice(0, -1);
    yield text.replace(/\r\n?/g, "\n");
    await new Promise((resolve) => setImmediate(resolve));
  }
}
