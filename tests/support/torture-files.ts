/** A file of the torture list: accepted whole, refused whole, or with rows kept out. */
export interface TortureFile {
  /** Number in the list. */
  id: string;
  name: string;
  kind?: "people" | "pairs";
  bytes: () => Buffer | string;
  /** Errors of a refusal, `path code`. */
  refused?: string[];
  /** Problems of rows, `line column code`. */
  problems?: string[];
  /** What the read names are, in the order of the file. */
  names?: string[];
  counts?: Record<string, number>;
}

const utf16 = (text: string) => Buffer.from(`\uFEFF${text}`, "utf16le");
const swapped = (bytes: Buffer) => Buffer.from(bytes).swap16();
const hex = (text: string) => Buffer.from(text, "hex");
const people = (header: string, ...rows: string[]) => `${[header, ...rows].join("\n")}\n`;
const twoNames = ["Ann Lee", "Bo Kim"];
const two = people("ref,name", "A,Ann Lee", "B,Bo Kim");

/** Encoding, line ends, quotes and separators. */
const SHAPES: TortureFile[] = [
  { id: "01", name: "UTF-8 with a mark", bytes: () => `\uFEFF${two}`, names: twoNames },
  { id: "02", name: "UTF-16, little end, mark", bytes: () => utf16(two), names: twoNames },
  { id: "03", name: "UTF-16, big end, mark", bytes: () => swapped(utf16(two)), names: twoNames },
  {
    id: "04",
    name: "UTF-16 without a mark",
    bytes: () => utf16(two).subarray(2),
    refused: ["file encoding"],
  },
  {
    id: "05",
    name: "latin-1",
    bytes: () => Buffer.from("ref,name\nA,Ren\xe9\n", "latin1"),
    refused: ["file.line.2.byte.15 encoding"],
  },
  {
    id: "06",
    name: "a byte that is no UTF-8 in the middle of a long file",
    bytes: () => {
      const good = Array.from({ length: 20_000 }, (_, at) => `R${at},Zoë ${at}\n`).join("");
      return Buffer.concat([Buffer.from(`ref,name\n${good}X,`), hex("c328"), Buffer.from("\n")]);
    },
    refused: ["file.line.20002.byte.337792 encoding"],
  },
  { id: "07", name: "CRLF", bytes: () => two.replaceAll("\n", "\r\n"), names: twoNames },
  { id: "08", name: "LF", bytes: () => two, names: twoNames },
  {
    id: "09",
    name: "CR alone, and mixed",
    bytes: () => "ref,name\rA,Ann Lee\r\nB,Bo Kim\r",
    names: twoNames,
  },
  { id: "10", name: "no last line end", bytes: () => two.trimEnd(), names: twoNames },
  {
    id: "11",
    name: "a quoted comma",
    bytes: () => 'ref,name\nA,"Lee, Ann"\n',
    names: ["Lee, Ann"],
  },
  {
    id: "12",
    name: "a quoted line break",
    bytes: () => 'ref,name,address\nA,Ann,"Mill 1\nrear"\nB,Bo,\n',
    names: ["Ann", "Bo"],
  },
  {
    id: "13",
    name: "a doubled quotation mark",
    bytes: () => 'ref,name\nA,"Ann ""Nan"" Lee"\n',
    names: ['Ann "Nan" Lee'],
  },
  {
    id: "14",
    name: "a quotation mark never closed",
    bytes: () => 'ref,name\nA,Ann\nB,"Bo\nC,Cy\n',
    refused: ["file.line.3 unclosed_quote"],
  },
  {
    id: "15a",
    name: "semicolons",
    bytes: () => two.replaceAll(",", ";"),
    names: twoNames,
  },
  { id: "15b", name: "tabs", bytes: () => two.replaceAll(",", "\t"), names: twoNames },
  {
    id: "15c",
    name: "semicolons, with commas in the quoted headings and cells",
    bytes: () => '"ref";"name"\nA;"Lee, Ann, jr"\n',
    names: ["Lee, Ann, jr"],
  },
  {
    id: "16",
    name: "NUL in a cell",
    bytes: () => people("ref,name", "A,An\0n", "B,Bo"),
    problems: ["2 name bad_character"],
  },
  {
    id: "22",
    name: "rows too short and too long",
    bytes: () => people("ref,name,area", "A,Ann", "B,Bo,North,more", "C,Cy,West"),
    problems: ["2 row ragged_row", "3 row ragged_row"],
  },
  {
    id: "52",
    name: "a hundred thousand blank lines at the end",
    bytes: () => two + "\n".repeat(100_000),
    names: twoNames,
  },
];

/** Headings, sizes and what is no text at all. */
const WHOLES: TortureFile[] = [
  {
    id: "19",
    name: "a heading twice",
    bytes: () => people("ref,name,name", "A,B,C"),
    refused: ["file.columns.name duplicate_column"],
  },
  {
    id: "20",
    name: "headings that name the prototype",
    bytes: () => people("ref,__proto__,constructor", "A,B,C"),
    refused: ["file.columns.2 unknown_column", "file.columns.3 unknown_column"],
  },
  {
    id: "21",
    name: "a required heading missing",
    bytes: () => people("name,area", "Ann,North"),
    refused: ["file.columns.ref required_column"],
  },
  {
    id: "36",
    name: "a cell of 10 MB",
    bytes: () => people("ref,name", `A,${"x".repeat(10_000_000)}`),
    refused: ["file.line.2 row_too_long"],
  },
  {
    id: "37",
    name: "5,000 columns",
    bytes: () => people(["ref", ...Array.from({ length: 4999 }, (_, at) => `c${at}`)].join(), "A"),
    refused: ["file.columns too_many"],
  },
  { id: "40", name: "zip", bytes: () => hex("504b03041400000008"), refused: ["file not_csv"] },
  { id: "41", name: "gzip", bytes: () => hex("1f8b0800000000000003"), refused: ["file not_csv"] },
  {
    id: "42",
    name: "a spreadsheet",
    bytes: () => Buffer.concat([hex("504b0304"), Buffer.from("[Content_Types].xml")]),
    refused: ["file not_csv"],
  },
  { id: "43", name: "PDF", bytes: () => "%PDF-1.7\nref,name\n", refused: ["file not_csv"] },
  { id: "44", name: "nothing", bytes: () => Buffer.alloc(0), refused: ["file empty_file"] },
  { id: "45", name: "headings only", bytes: () => "ref,name\n", refused: ["file empty_file"] },
];

const onsets = (...days: string[]) =>
  people("ref,onset_date", ...days.map((day, at) => `R${at},${day}`));

/** What stands in the cells. */
const CELLS: TortureFile[] = [
  {
    id: "17",
    name: "cells that a spreadsheet would run",
    bytes: () =>
      people("ref,name", "A,=cmd|' /C calc'!A0", "B,+1+1", "C,-2", "D,@SUM(1)", 'E,"\t=1"'),
    names: ["=cmd|' /C calc'!A0", "+1+1", "-2", "@SUM(1)", "=1"],
    counts: { formulas: 5 },
  },
  { id: "18", name: "a full-width sign", bytes: () => people("ref,name", "A,＝1"), names: ["＝1"] },
  {
    id: "17b",
    name: "what our own export put before them is taken off once",
    bytes: () => people("ref,name,phone", "A,'=1,'+44 161 496 0811", "B,''=1,", "C,'Ann,"),
    names: ["=1", "'=1", "'Ann"],
  },
  {
    id: "23",
    name: "leap days",
    bytes: () => onsets("2023-02-29", "2024-02-29"),
    problems: ["2 onset_date not_a_day"],
  },
  {
    id: "24",
    name: "days and months that are none",
    bytes: () => onsets("31/04/2024", "2024-04-31", "2024-13-01"),
    problems: ["2 onset_date not_a_day", "3 onset_date not_a_day", "4 onset_date not_a_day"],
  },
  {
    id: "25",
    name: "a date that could be two",
    bytes: () => onsets("03/04/2024", "2024-04-03"),
    problems: ["2 onset_date not_a_day"],
  },
  {
    id: "26",
    name: "a year of two digits",
    bytes: () => onsets("24-04-03", "2024-04-03"),
    problems: ["2 onset_date not_a_day"],
  },
  {
    id: "27",
    name: "years out of range and days to come",
    bytes: () => onsets("0001-01-01", "9999-01-01", "2099-01-01", "2024-01-01"),
    problems: ["2 onset_date not_a_day", "3 onset_date not_a_day", "4 onset_date in_future"],
  },
  {
    id: "28",
    name: "an instant with an offset is its local day",
    bytes: () => onsets("2024-03-02T01:30:00+05:30", "2024-03-01T23:30:00-01:00"),
  },
  {
    id: "29",
    name: "times in the gap and the overlap of summer time",
    bytes: () => onsets("2024-03-31T01:30", "2024-10-27 01:30:00", "2024-10-27T25:00"),
    problems: ["4 onset_date not_a_day"],
  },
  {
    id: "30",
    name: "a spreadsheet's number for a day",
    bytes: () => onsets("45351", "2024-02-29"),
    problems: ["2 onset_date not_a_day"],
  },
  {
    id: "31",
    name: "a name from right to left",
    bytes: () => people("ref,name", "A,مريم"),
    names: ["مريم"],
  },
  {
    id: "32",
    name: "characters that turn text round",
    bytes: () => people("ref,name", "A,Ann\u202Eeel", "B,Bo\u2066", "C,Cy"),
    problems: ["2 name bad_character", "3 name bad_character"],
  },
  {
    id: "33",
    name: "joined emoji and astral characters",
    bytes: () => people("ref,name", "A,🧑🏽‍🚀", "B,𝔄𝔫𝔫"),
    names: ["🧑🏽‍🚀", "𝔄𝔫𝔫"],
  },
  {
    id: "34",
    name: "one name composed and decomposed",
    bytes: () => people("ref,name", "A,José Almansa", "B,Jose\u0301 Almansa"),
    counts: { setAside: 1 },
  },
  {
    id: "35",
    name: "a cell of 64 kB",
    bytes: () => people("ref,name", `A,${"x".repeat(65_536)}`, "B,Bo"),
    problems: ["2 name too_long"],
  },
  {
    id: "48",
    name: "telephones in many spellings, and one a spreadsheet made",
    bytes: () =>
      people(
        "ref,phone",
        "A,+44 161 496 0811",
        "B,0044 161 496 0812",
        "C,(0161) 496-0813",
        "D,1.23E+11",
      ),
    problems: ["5 phone not_a_phone"],
  },
  {
    id: "49",
    name: "markup",
    bytes: () => people("ref,name", "A,<img src=x onerror=alert(1)>"),
    names: ["<img src=x onerror=alert(1)>"],
  },
  {
    id: "51",
    name: "words for nothing known",
    bytes: () =>
      people(
        "ref,name,area,sex,classification,onset_date,phone",
        "A,NULL,N/A,-,N/A,n/a,-",
        "B,Unknown,,,,UNKNOWN,–",
        "N/A,Ann,,,,,",
      ),
    problems: ["4 ref required"],
  },
];

const PAIRS: TortureFile[] = [
  {
    id: "53",
    name: "a contact of somebody not on record",
    kind: "pairs",
    bytes: () => people("ref_a,ref_b", "P1,NOBODY", "P1,P2"),
    problems: ["2 ref_b unknown_ref"],
  },
  {
    id: "54",
    name: "a contact of oneself",
    kind: "pairs",
    bytes: () => people("ref_a,ref_b", "P1,P1", "P1,P2"),
    problems: ["2 ref_b self_contact"],
  },
  {
    id: "55",
    name: "contacts in a ring, and told twice",
    kind: "pairs",
    bytes: () => people("ref_a,ref_b", "P1,P2", "P2,P3", "P3,P1", "P2,P1", "P1,P2"),
    counts: { repeated: 2 },
  },
];

export const TORTURE_FILES: readonly TortureFile[] = [...SHAPES, ...WHOLES, ...CELLS, ...PAIRS];
