import { customType, pgSchema, timestamp, uuid } from "drizzle-orm/pg-core";

/** Pseudonymous data; identity apart from it; accounts and sessions; the access record. */
export const core = pgSchema("core");
export const identity = pgSchema("identity");
export const auth = pgSchema("auth");
export const audit = pgSchema("audit");

/** Binary column (ciphertext, keyed tokens). */
export const bytea = customType<{ data: Buffer; driverData: Buffer }>({ dataType: () => "bytea" });

/** Instants are ISO strings in UTC end to end; days are `YYYY-MM-DD` text. */
export const at = (name: string) => timestamp(name, { withTimezone: true, mode: "string" });
export const recordedAt = () => at("recorded_at").notNull().defaultNow();
export const ref = (name: string) => uuid(name);
