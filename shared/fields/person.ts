import { table } from "./define.ts";

/** Pseudonymous columns of a person: what graph code and the epidemiologist may read. */
export const PERSON_FIELDS = table("core.person", [
  ["id", "operational", "FFFF", { key: "id" }],
  ["investigation_id", "operational", "FFFF"],
  ["study_number", "operational", "FFFF", { key: "studyNumber", sortable: true }],
  ["sex", "quasi", "FFFF", { key: "sex", sortable: true }],
  ["age_band", "quasi", "FFFF", { key: "ageBand", sortable: true }],
  ["area", "quasi", "FFFF", { key: "area", sortable: true }],
  ["occupation", "quasi", "FFFN", { key: "occupation", sortable: true }],
  ["household_id", "quasi", "FFFF"],
  ["classification", "health", "FFFF", { key: "classification", sortable: true }],
  ["case_definition_version", "operational", "FFFF"],
  ["onset_date", "health", "FFFF", { key: "onsetDate", sortable: true }],
  ["specimen_date", "health", "FFFF", { key: "specimenDate", sortable: true }],
  ["result_date", "health", "FFFF", { key: "resultDate", sortable: true }],
  ["result", "health", "FFFF", { key: "result", sortable: true }],
  ["report_date", "health", "FFFF", { key: "reportDate", sortable: true }],
  ["interview_date", "operational", "FFFF", { key: "interviewDate", sortable: true }],
  ["interviewed", "operational", "FFFF", { key: "interviewed", sortable: true }],
  ["interview_state", "operational", "FFFF", { key: "interviewState", sortable: true }],
  ["isolation_date", "health", "FFFF", { key: "isolationDate", sortable: true }],
  ["outcome", "health", "FFFF", { key: "outcome", sortable: true }],
  ["outcome_date", "health", "FFFF", { key: "outcomeDate", sortable: true }],
  ["became_case", "health", "FFFF", { key: "becameCase" }],
  ["assigned_account_id", "operational", "FFNF", { key: "assignedTo" }],
  ["assigned_team_id", "operational", "FFNF"],
  ["source", "operational", "FFFF"],
  ["version", "operational", "FFFF", { key: "version" }],
  ["recorded_at", "operational", "FFFF", { key: "recordedAt", sortable: true }],
  ["recorded_by", "operational", "FFNF"],
  ["updated_at", "operational", "FFFF"],
  ["withdrawn_at", "operational", "FFFF"],
]);

/** Encrypted columns that say who a person is, with their masked and coarse companions. */
export const IDENTITY_FIELDS = table("identity.person", [
  ["person_id", "operational", "FFNF"],
  ["investigation_id", "operational", "NNNN"],
  ["ref_cipher", "direct", "FFNF", { key: "ref", cipher: true }],
  ["ref_token", "direct", "NNNN"],
  [
    "name_cipher",
    "direct",
    "FFNM",
    { key: "name", cipher: true, masked: { column: "name_masked", key: "nameMasked" } },
  ],
  ["name_masked", "quasi", "FFNF"],
  [
    "phone_cipher",
    "direct",
    "FFNM",
    { key: "phone", cipher: true, masked: { column: "phone_last2", key: "phoneLast2" } },
  ],
  ["phone_last2", "quasi", "FFNF"],
  [
    "email_cipher",
    "direct",
    "FFNM",
    { key: "email", cipher: true, masked: { column: "email_masked", key: "emailMasked" } },
  ],
  ["email_masked", "quasi", "FFNF"],
  [
    "birth_date_cipher",
    "direct",
    "FFNC",
    { key: "birthDate", cipher: true, coarse: { column: "birth_year", key: "birthYear" } },
  ],
  ["birth_year", "quasi", "FFNF"],
  ["address_cipher", "direct", "FFNN", { key: "address", cipher: true }],
  ["note_cipher", "direct", "FFNN", { key: "note", cipher: true }],
]);

/** The other identity tables: search tokens, household names, drafts, staged files, wrapped keys. */
export const IDENTITY_OTHER_FIELDS = [
  ...table("identity.search_token", [
    ["person_id", "operational", "NNNN"],
    ["investigation_id", "operational", "NNNN"],
    ["kind", "operational", "NNNN"],
    ["token", "direct", "NNNN"],
  ]),
  ...table("identity.place", [
    ["place_id", "operational", "NNNN"],
    ["investigation_id", "operational", "NNNN"],
    ["name_cipher", "direct", "FFNN", { cipher: true }],
    ["name_token", "direct", "NNNN"],
  ]),
  ...table("identity.follow_check", [
    ["check_id", "operational", "NNNN"],
    ["investigation_id", "operational", "NNNN"],
    ["note_cipher", "direct", "FFNN", { cipher: true }],
  ]),
  ...table("identity.interview_draft", [
    ["person_id", "operational", "NNNN"],
    ["investigation_id", "operational", "NNNN"],
    ["account_id", "operational", "NNNN"],
    ["body_cipher", "direct", "NNNN", { cipher: true, retention: "session" }],
    ["version", "operational", "NNNN"],
    ["updated_at", "operational", "NNNN"],
  ]),
  ...table("identity.import_stage", [
    ["import_id", "operational", "NNNN"],
    ["investigation_id", "operational", "NNNN"],
    ["chunk", "operational", "NNNN"],
    ["body_cipher", "direct", "NNNN", { cipher: true, retention: "session" }],
  ]),
  ...table("identity.export_part", [
    ["export_id", "operational", "NNNN"],
    ["investigation_id", "operational", "NNNN"],
    ["part", "operational", "NNNN"],
    ["body_cipher", "direct", "NNNN", { cipher: true, retention: "session" }],
  ]),
  ...table("identity.data_key", [
    ["investigation_id", "operational", "NNNN"],
    ["wrapped_key", "operational", "NNNN"],
    ["recorded_at", "operational", "NNNN"],
  ]),
];
