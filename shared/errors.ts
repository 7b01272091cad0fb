/**
 * Every error the server can answer with: status, and the words shown to a person. Codes are
 * stable and never reused; field codes (in `errors[]`) come from `FIELD_ERRORS`.
 */
export const ERRORS = {
  not_signed_in: { status: 401, title: "Sign in to continue" },
  sign_in_failed: { status: 401, title: "E-mail or password is not right" },
  session_ended: { status: 401, title: "Your session has ended; sign in again" },
  origin_refused: { status: 403, title: "The request did not come from this site" },
  role_refused: { status: 403, title: "Your acting role cannot do this" },
  confirm_needed: { status: 403, title: "Give your password again to go on" },
  not_found: { status: 404, title: "Not found, or not yours to see" },
  method_not_allowed: { status: 405, title: "This address does not take that method" },
  idempotency_key_required: { status: 400, title: "The request needs an Idempotency-Key" },
  malformed_request: { status: 400, title: "The request could not be read" },
  stale_version: { status: 409, title: "Someone changed this record meanwhile" },
  conflict: { status: 409, title: "This clashes with what is on record" },
  in_flight: { status: 409, title: "The same request is still being worked on" },
  not_practice: { status: 409, title: "Only a practice investigation can be emptied" },
  practice_sends_nothing: {
    status: 409,
    title: "A practice investigation sends nothing; add people who have an account",
  },
  too_large: { status: 413, title: "The request is too large" },
  json_required: { status: 415, title: "The request must be JSON" },
  invalid: { status: 422, title: "Some fields need another look" },
  key_reused: { status: 422, title: "This Idempotency-Key was used for another request" },
  too_many_attempts: { status: 429, title: "Too many attempts; wait and try again" },
  internal: { status: 500, title: "Something went wrong on our side" },
  mail_off: { status: 503, title: "This installation sends no mail; its settings name no server" },
  unavailable: { status: 503, title: "The service is busy or restarting; try again shortly" },
} as const;
export type ErrorCode = keyof typeof ERRORS;

/** Codes that stand beside a field. */
export const FIELD_ERRORS = {
  required: "Needed",
  too_long: "Too long",
  too_short: "Too short",
  too_many: "Too many",
  too_small: "Too small",
  too_big: "Too large",
  not_a_number: "Not a number",
  not_a_whole_number: "Give a whole number",
  not_a_day: "Not a calendar day (YYYY-MM-DD, or YYYY-MM)",
  not_an_instant: "Not a date and time",
  out_of_range: "Outside the years 1900–2100",
  in_future: "In the future",
  not_in_list: "Not one of the choices",
  not_text: "Not readable text",
  bad_character: "Contains a character that cannot be kept",
  not_an_email: "Not an e-mail address",
  not_a_phone: "Not a telephone number",
  not_an_id: "Not an identifier",
  not_known: "Not on record",
  unknown_key: "Not a field of this form",
  wrong_type: "Not of the right kind",
  not_sortable: "This cannot be sorted by",
  last_before_first: "The last day is before the first",
  max_below_min: "The largest number is below the smallest",
  self_contact: "A person cannot be a contact of themselves",
  repeated: "Already in this list",
  result_before_specimen: "The result is before the specimen",
  before_day_zero: "Before day 0 of this contact",
  not_followed: "This person is not a contact with follow-up",
  already_ended: "This follow-up has been ended already",
  after_end: "After the day on which this follow-up was ended; reopen it first",
  only_with_symptoms: "Only where symptoms are reported",
  nobody_answered: "Nobody answered, so there is nothing to report",
  not_a_zone: "Not a time zone",
  common_password: "Too easy to guess; take other words",
  wrong_password: "Not your password",
  same_password: "This is the password you have",
  account_unknown: "No account with this e-mail",
  demo_only: "Demo accounts can only join an investigation marked invented",
  practice_is_invented: "A practice investigation stays marked invented",
  name_differs: "Not the name of this investigation",
  already_member: "Already holds this role here",
  last_leader: "An investigation keeps at least one supervisor or data officer with no end date",
  in_past: "In the past",
  team_taken: "There is a team of this name",
  team_in_use: "Members, invitations or people still belong to this team",
  not_for_role: "Your acting role cannot have this",
  only_for_people: "Only a list of people can be narrowed down",
  invalid: "Not valid",
  required_column: "This column is missing",
  unknown_column: "Not a column of this file",
  duplicate_column: "This column appears twice",
  ragged_row: "This row has too few or too many cells",
  ref_taken: "This reference is already on record",
  duplicate_ref: "This reference appears twice in the file",
  unknown_ref: "This reference is not on record",
  waiting_ref: "This reference stands in a row set aside; decide about it first",
  named_by_other: "Must be one of the two references, or blank",
  encoding: "Not readable text; save the file as UTF-8",
  not_csv: "This is not a CSV file",
  empty_file: "The file has no rows",
  too_many_rows: "Too many rows",
  unclosed_quote: "A quotation mark is not closed",
  stray_quote: "A quotation mark stands in the middle of a cell",
  row_too_long: "A row is too long; perhaps a quotation mark is not closed",
  wrong_delimiter: "Cells must be separated by commas, semicolons or tabs",
  other_columns: "The choice of columns was made for another file",
  conflict: "Differs from what is on record; not stored",
  stage_dropped: "The checked rows were deleted after a day; upload the file again",
  export_failed: "The file could not be made; nothing was kept of it",
  export_no_access: "You signed out or changed role before it was finished; nothing was kept",
  compare_failed: "The comparison could not be finished; nothing was kept of it",
  compare_interrupted: "The server was restarted before it was finished; run it again",
  commit_failed: "The import could not be finished; nothing was stored",
  commit_clash: "Someone recorded the same reference meanwhile; nothing was stored",
  commit_no_access: "You signed out or changed role before it was finished; nothing was stored",
} as const;
export type FieldErrorCode = keyof typeof FIELD_ERRORS;

/** One field's error: a dotted path and a code. Values are never echoed. */
export interface FieldError {
  path: string;
  code: FieldErrorCode;
}

/** The body of every error (RFC 9457, media type application/problem+json). */
export interface Problem {
  type: string;
  title: string;
  status: number;
  code: ErrorCode;
  /** Names the request; absent where absent and hidden records must answer alike (404). */
  instance?: string;
  errors?: FieldError[];
}
