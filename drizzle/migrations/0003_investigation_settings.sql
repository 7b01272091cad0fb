CREATE TABLE "core"."setting_change" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"version" integer NOT NULL,
	"changes" jsonb NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid
);
--> statement-breakpoint
ALTER TABLE "core"."case_definition" ADD COLUMN "rules" jsonb;--> statement-breakpoint
ALTER TABLE "core"."investigation" ADD COLUMN "cluster_window_days" integer DEFAULT 14 NOT NULL;--> statement-breakpoint
ALTER TABLE "core"."investigation" ADD COLUMN "cluster_minimum_cases" integer DEFAULT 2 NOT NULL;--> statement-breakpoint
ALTER TABLE "core"."investigation" ADD COLUMN "closure_days" integer;--> statement-breakpoint
ALTER TABLE "core"."investigation" ADD COLUMN "small_cell_threshold" integer DEFAULT 5 NOT NULL;--> statement-breakpoint
ALTER TABLE "core"."investigation" ADD COLUMN "exposure_grading" jsonb;--> statement-breakpoint
ALTER TABLE "core"."investigation" ADD COLUMN "symptoms" jsonb;--> statement-breakpoint
ALTER TABLE "core"."investigation" ADD COLUMN "texts" jsonb DEFAULT '[]'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "core"."investigation" ADD COLUMN "practice" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "core"."setting_change" ADD CONSTRAINT "setting_change_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "setting_change_version" ON "core"."setting_change" USING btree ("investigation_id","version");