CREATE TABLE "identity"."export_part" (
	"export_id" uuid NOT NULL,
	"investigation_id" uuid NOT NULL,
	"part" integer NOT NULL,
	"body_cipher" "bytea" NOT NULL,
	CONSTRAINT "export_part_export_id_part_pk" PRIMARY KEY("export_id","part")
);
--> statement-breakpoint
CREATE TABLE "core"."export" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"identified" boolean NOT NULL,
	"purpose" text NOT NULL,
	"reason" text,
	"role" text NOT NULL,
	"filter" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"columns" text[] NOT NULL,
	"state" text NOT NULL,
	"progress" real DEFAULT 0 NOT NULL,
	"failure" text,
	"row_count" integer DEFAULT 0 NOT NULL,
	"bytes" integer DEFAULT 0 NOT NULL,
	"parts" integer DEFAULT 0 NOT NULL,
	"sha256" text,
	"downloads" integer DEFAULT 0 NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"finished_at" timestamp with time zone,
	"expires_at" timestamp with time zone
);
--> statement-breakpoint
ALTER TABLE "core"."export" ADD CONSTRAINT "export_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "export_recorded" ON "core"."export" USING btree ("investigation_id","recorded_at");