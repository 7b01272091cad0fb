CREATE TABLE "identity"."import_match" (
	"id" uuid PRIMARY KEY NOT NULL,
	"import_id" uuid NOT NULL,
	"investigation_id" uuid NOT NULL,
	"line" integer NOT NULL,
	"ref_token" "bytea" NOT NULL,
	"other_id" uuid,
	"matched_on" text NOT NULL,
	"body_cipher" "bytea",
	"state" text DEFAULT 'open' NOT NULL,
	"decided_by" uuid,
	"decided_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "identity"."ref_alias" (
	"investigation_id" uuid NOT NULL,
	"ref_token" "bytea" NOT NULL,
	"person_id" uuid NOT NULL,
	CONSTRAINT "ref_alias_investigation_id_ref_token_pk" PRIMARY KEY("investigation_id","ref_token")
);
--> statement-breakpoint
ALTER TABLE "core"."import" ADD COLUMN "reading" jsonb;--> statement-breakpoint
ALTER TABLE "identity"."import_match" ADD CONSTRAINT "import_match_import_id_import_id_fk" FOREIGN KEY ("import_id") REFERENCES "core"."import"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "identity"."import_match" ADD CONSTRAINT "import_match_other_id_person_id_fk" FOREIGN KEY ("other_id") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "identity"."ref_alias" ADD CONSTRAINT "ref_alias_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "import_match_line" ON "identity"."import_match" USING btree ("import_id","line");--> statement-breakpoint
CREATE INDEX "import_match_ref" ON "identity"."import_match" USING btree ("investigation_id","ref_token");