import type { Identity } from "../../identity/sealed-identity.ts";
import type { StagedPerson } from "./staged-row.ts";

/** Identity cells of a row; the keys that the row leaves out are left out, or null when `whole`. */
export function identityOf(cells: StagedPerson["cells"], whole: boolean): Identity {
  const identity: Identity = {};
  const put = (key: keyof Identity, value: string | undefined) => {
    if (value !== undefined) identity[key] = value;
    else if (whole) identity[key] = null;
  };
  put("name", cells.name);
  put("phone", cells.phone);
  put("email", cells.email);
  put("birthDate", cells.birth_date);
  put("address", cells.address);
  return identity;
}

/** Identity of somebody new as a row tells it: what is blank was not asked. */
export function newIdentityOf(cells: StagedPerson["cells"]): Identity {
  return { ref: cells.ref, ...identityOf(cells, true) };
}
