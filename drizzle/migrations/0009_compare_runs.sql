CREATE TABLE "core"."compare_run" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"name" text NOT NULL,
	"state" text NOT NULL,
	"progress" real DEFAULT 0 NOT NULL,
	"reached" integer DEFAULT 0 NOT NULL,
	"replicates" integer NOT NULL,
	"seed" bigint NOT NULL,
	"population" text NOT NULL,
	"time_window" text NOT NULL,
	"from_day" text,
	"to_day" text,
	"attribute" text,
	"question" jsonb NOT NULL,
	"as_of" text NOT NULL,
	"cut_off" timestamp with time zone NOT NULL,
	"graph_version" bigint NOT NULL,
	"core_version" text NOT NULL,
	"generator" text NOT NULL,
	"people" integer DEFAULT 0 NOT NULL,
	"pairs" integer DEFAULT 0 NOT NULL,
	"input" "bytea",
	"result" jsonb,
	"failure" text,
	"again_of" uuid,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"finished_at" timestamp with time zone
);
--> statement-breakpoint
ALTER TABLE "core"."compare_run" ADD CONSTRAINT "compare_run_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "compare_run_recorded" ON "core"."compare_run" USING btree ("investigation_id","recorded_at");