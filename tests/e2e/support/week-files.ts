/** A row of the team's list: as it should stand, and how it was mistyped first. */
interface ListRow {
  good: readonly string[];
  planted?: { cells: readonly string[]; column: string; code: string };
}

/** A problem as the list of problems names it. */
export type PlantedProblem = readonly [line: number, column: string, code: string];

/** A spreadsheet as it was brought first, and put right. */
export interface WeekFile {
  faulty: string;
  corrected: string;
  /** Exactly what the check of the faulty one has to say. */
  problems: PlantedProblem[];
  /** Column of ours by the place of a heading, from 1; other headings are left out. */
  columns: Readonly<Record<number, string>>;
}

/** A day so many days before today in UTC, the zone of these tests. */
export function daysAgo(days: number): string {
  return new Date(Date.now() - days * 86_400_000).toISOString().slice(0, 10);
}

function fileOf(headings: readonly string[], rows: readonly ListRow[], separator: string) {
  const text = (list: readonly (readonly string[])[]) =>
    list.map((cells) => `${cells.join(separator)}\r\n`).join("");
  return {
    faulty: text([headings, ...rows.map(({ good, planted }) => planted?.cells ?? good)]),
    corrected: text([headings, ...rows.map(({ good }) => good)]),
    problems: rows.flatMap(({ planted }, at): PlantedProblem[] =>
      planted ? [[at + 2, planted.column, planted.code]] : [],
    ),
  };
}

const peopleHeadings = [
  "Kennung",
  "Voller Name",
  "Rufnummer",
  "Geburtstag",
  "Wohngegend",
  "Einstufung",
  "Erkrankt am",
  "Probe am",
  "Befund am",
  "Befund",
  "Befragt",
  "Haushalt",
  "Bemerkung",
] as const;

const at = (heading: (typeof peopleHeadings)[number]) => peopleHeadings.indexOf(heading);

type Cells = Partial<Record<(typeof peopleHeadings)[number], string>>;

const cellsOf = (known: Cells) => peopleHeadings.map((heading) => known[heading] ?? "");

/** Three confirmed cases who fell ill one after the other. */
function caseRow(ref: string, name: string, onset: number): ListRow {
  return {
    good: cellsOf({
      Kennung: ref,
      "Voller Name": name,
      Geburtstag: "1979-04-12",
      Wohngegend: "Nordkai",
      Einstufung: "confirmed",
      "Erkrankt am": daysAgo(onset),
      "Probe am": daysAgo(onset - 1),
      "Befund am": daysAgo(onset - 2),
      Befund: "positive",
      Befragt: "yes",
      Bemerkung: "bleibt draussen",
    }),
  };
}

function contactRow(ref: string, name: string, more: Cells = {}): ListRow {
  return {
    good: cellsOf({ Kennung: ref, "Voller Name": name, Einstufung: "contact", ...more }),
  };
}

/** A contact in whose row one cell was mistyped. */
function mistyped(
  ref: string,
  name: string,
  wrong: readonly [heading: (typeof peopleHeadings)[number], value: string],
  column: string,
  code: string,
  more: Cells = {},
): ListRow {
  const { good } = contactRow(ref, name, more);
  const cells = good.map((cell, place) => (place === at(wrong[0]) ? wrong[1] : cell));
  return { good, planted: { cells, column, code } };
}

/** People behind semicolons and headings that are not ours; a dozen of its rows are wrong at first. */
export function peopleFile(): WeekFile {
  const ragged = contactRow("R-15", "Ulla Fünftens");
  const rows: ListRow[] = [
    caseRow("R-01", "Anselm Brandung", 9),
    caseRow("R-02", "Berit Deichsel", 6),
    caseRow("R-03", "Corvin Ebbinger", 4),
    contactRow("R-04", "Jördis Quellbach", { Rufnummer: "0161 496 0411", Haushalt: "Quellbach" }),
    contactRow("R-05", "Detmar Fährmann", { Haushalt: "Brandung" }),
    // What a spreadsheet would run stays text.
    contactRow("R-06", "Enno Gezeiten", { Wohngegend: "=1+1" }),
    contactRow("R-07", "Frauke Hafner", { Rufnummer: "0161 496 0417" }),
    contactRow("R-08", "Gesa Inselmann"),
    contactRow("R-09", "Hauke Jollensen"),
    // The one of R-04 once more, as somebody else heard the name.
    contactRow("R-10", "Joerdis Quellbach", { Rufnummer: "0161-496-0411" }),
    mistyped("R-11", "Imke Kajute", ["Erkrankt am", "05.11.2025"], "onset_date", "not_a_day"),
    mistyped("R-12", "Jelto Lotsen", ["Kennung", "R-01"], "ref", "duplicate_ref"),
    mistyped("R-13", "Keike Molen", ["Kennung", ""], "ref", "required"),
    mistyped(
      "R-14",
      "Lüder Nebelhorn",
      ["Einstufung", "wahrscheinlich"],
      "classification",
      "not_in_list",
    ),
    {
      ...ragged,
      planted: { cells: ragged.good.slice(0, 6), column: "row", code: "ragged_row" },
    },
    mistyped("R-16", "Mieke Ostwind", ["Erkrankt am", "2099-01-01"], "onset_date", "in_future"),
    mistyped("R-17", "Nanno Pegel", ["Rufnummer", "drei vier"], "phone", "not_a_phone", {
      Rufnummer: "0161 496 0427",
    }),
    mistyped("R-18", "Okka Quermast", ["Geburtstag", "1990-02-30"], "birth_date", "not_a_day", {
      Geburtstag: "1990-02-28",
    }),
    mistyped(
      "R-19",
      "Poppe Riffel",
      ["Befund am", daysAgo(9)],
      "result_date",
      "result_before_specimen",
      { "Probe am": daysAgo(3), "Befund am": daysAgo(2), Befund: "negative" },
    ),
    mistyped("R-20", "Renske Sielmann", ["Geburtstag", "1776-07-04"], "birth_date", "not_a_day"),
    mistyped("R-21", "Sievert Tiden", ["Befund", "vielleicht"], "result", "not_in_list", {
      "Probe am": daysAgo(3),
      Befund: "pending",
    }),
    mistyped("R-22", "Tjorven Untiefe", ["Befragt", "morgen"], "interviewed", "not_in_list", {
      Befragt: "no",
    }),
    mistyped("R-23", "Uwe Vorland", ["Voller Name", "Uwe \u202EVorland"], "name", "bad_character"),
  ];
  return {
    ...fileOf(peopleHeadings, rows, ";"),
    columns: {
      1: "ref",
      2: "name",
      3: "phone",
      4: "birth_date",
      5: "area",
      6: "classification",
      7: "onset_date",
      8: "specimen_date",
      9: "result_date",
      10: "result",
      11: "interviewed",
      12: "household",
    },
  };
}

/** Contact pairs behind tabs; two of its rows cannot be so. */
export function pairsFile(): WeekFile {
  const pair = (a: string, b: string, setting: string, first = 8, last = 3): ListRow => ({
    good: [a, b, daysAgo(first), daysAgo(last), setting, "Reepschlägerei", a],
  });
  const self = pair("R-03", "R-07", "social");
  const turned = pair("R-02", "R-09", "workplace");
  const rows: ListRow[] = [
    pair("R-01", "R-02", "workplace", 11, 8),
    pair("R-02", "R-03", "workplace", 7, 5),
    pair("R-01", "R-04", "social"),
    pair("R-01", "R-05", "household"),
    pair("R-02", "R-06", "workplace"),
    {
      ...self,
      planted: {
        cells: self.good.with(1, "R-03"),
        column: "ref_b",
        code: "self_contact",
      },
    },
    pair("R-03", "R-08", "transport"),
    {
      ...turned,
      planted: {
        cells: turned.good.with(3, daysAgo(20)),
        column: "last_exposure",
        code: "last_before_first",
      },
    },
    // By the reference of the row that was somebody on record.
    pair("R-03", "R-10", "social"),
  ];
  const headings = ["Person eins", "Person zwei", "Zuerst", "Zuletzt", "Art", "Wo", "Sagt"];
  return {
    ...fileOf(headings, rows, "\t"),
    columns: {
      1: "ref_a",
      2: "ref_b",
      3: "first_exposure",
      4: "last_exposure",
      5: "setting",
      6: "place",
      7: "named_by",
    },
  };
}

/** Words of the faulty people file that no list of problems may repeat. */
export const plantedValues = [
  "05.11.2025",
  "wahrscheinlich",
  "drei vier",
  "1990-02-30",
  "1776",
  "vielleicht",
  "morgen",
  "Vorland",
  "R-01",
  "2099",
];
