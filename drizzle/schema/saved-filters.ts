import { sql } from "drizzle-orm";
import { index, integer, jsonb, text, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import { investigationId } from "./investigations.ts";
import { at, core, recordedAt } from "./shared.ts";

/** A question to the line list that somebody gave a name: coded values only, nothing typed. */
export const savedFilter = core.table(
  "saved_filter",
  {
    id: uuid("id").primaryKey(),
    investigationId: investigationId(),
    accountId: uuid("account_id").notNull(),
    name: text("name").notNull(),
    filter: jsonb("filter").notNull(),
    version: integer("version").notNull().default(1),
    recordedAt: recordedAt(),
    updatedAt: at("updated_at").notNull().defaultNow(),
  },
  (t) => [
    uniqueIndex("saved_filter_name").on(t.investigationId, t.accountId, sql`lower(${t.name})`),
    index("saved_filter_account").on(t.accountId),
  ],
);
