/** Other ways to write our columns; kept short, since a person sees and can change each. */
const OTHER_WORDS: ReadonlyMap<string, string> = new Map([
  ["reference", "ref"],
  ["id", "ref"],
  ["full_name", "name"],
  ["telephone", "phone"],
  ["phone_number", "phone"],
  ["telephone_number", "phone"],
  ["mobile", "phone"],
  ["e_mail", "email"],
  ["email_address", "email"],
  ["dob", "birth_date"],
  ["date_of_birth", "birth_date"],
  ["gender", "sex"],
  ["home_address", "address"],
  ["district", "area"],
  ["job", "occupation"],
  ["case_status", "classification"],
  ["status", "classification"],
  ["onset", "onset_date"],
  ["date_of_onset", "onset_date"],
  ["symptom_onset", "onset_date"],
  ["sample_date", "specimen_date"],
  ["test_result", "result"],
  ["date_reported", "report_date"],
  ["date_of_death", "died_date"],
  ["death_date", "died_date"],
  ["isolated_on", "isolation_date"],
  ["person_a", "ref_a"],
  ["person_b", "ref_b"],
  ["first_contact", "first_exposure"],
  ["last_contact", "last_exposure"],
  ["location", "place"],
  ["duration_minutes", "minutes"],
  ["distance", "distance_m"],
  ["reported_by", "named_by"],
]);

/** A heading without case, accents and punctuation: "Onset date" gives onset_date. */
function folded(heading: string): string {
  return heading
    .normalize("NFKD")
    .replace(/\p{M}/gu, "")
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, "_")
    .replace(/^_|_$/g, "");
}

export interface HeadingMatch {
  column: string | null;
  how: "exact" | "alike" | "unknown";
}

/**
 * Which of our columns a heading stands for: exactly, or by another spelling or word for it.
 *
 * @param columns the columns a file of its kind may have
 */
export function matchHeading(heading: string, columns: readonly string[]): HeadingMatch {
  const written = heading.trim();
  if (columns.includes(written)) return { column: written, how: "exact" };
  const plain = folded(written);
  const other = columns.includes(plain) ? plain : OTHER_WORDS.get(plain);
  return other !== undefined && columns.includes(other)
    ? { column: other, how: "alike" }
    : { column: null, how: "unknown" };
}
