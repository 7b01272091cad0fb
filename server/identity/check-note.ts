import { open, seal } from "./cipher.ts";
import type { InvestigationKeys } from "./keys.ts";

const place = (checkId: string) => `identity.follow_check|note_cipher|${checkId}`;

/** Seals and opens the note beside a check; moved to another check it does not open. */
export const checkNote = {
  seal: (keys: InvestigationKeys, checkId: string, note: string) =>
    seal(keys.seal, place(checkId), note),
  open: (keys: InvestigationKeys, checkId: string, cipher: Buffer) =>
    open(keys.seal, place(checkId), cipher).toString(),
};
