CREATE TABLE "core"."saved_filter" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"account_id" uuid NOT NULL,
	"name" text NOT NULL,
	"filter" jsonb NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
DROP INDEX "core"."person_recorded";--> statement-breakpoint
DROP INDEX "core"."person_classification";--> statement-breakpoint
DROP INDEX "core"."person_onset";--> statement-breakpoint
DROP INDEX "core"."person_report";--> statement-breakpoint
ALTER TABLE "core"."saved_filter" ADD CONSTRAINT "saved_filter_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "saved_filter_name" ON "core"."saved_filter" USING btree ("investigation_id","account_id",lower("name"));--> statement-breakpoint
CREATE INDEX "saved_filter_account" ON "core"."saved_filter" USING btree ("account_id");--> statement-breakpoint
CREATE INDEX "person_list_recorded" ON "core"."person" USING btree ("investigation_id","recorded_at","id") WHERE "core"."person"."withdrawn_at" is null;--> statement-breakpoint
CREATE INDEX "person_list_study" ON "core"."person" USING btree ("investigation_id","study_number","id") WHERE "core"."person"."withdrawn_at" is null;--> statement-breakpoint
CREATE INDEX "person_list_class" ON "core"."person" USING btree ("investigation_id","classification","id") WHERE "core"."person"."withdrawn_at" is null;--> statement-breakpoint
CREATE INDEX "person_list_onset" ON "core"."person" USING btree ("investigation_id","onset_date","id") WHERE "core"."person"."withdrawn_at" is null;--> statement-breakpoint
CREATE INDEX "person_list_report" ON "core"."person" USING btree ("investigation_id","report_date","id") WHERE "core"."person"."withdrawn_at" is null;--> statement-breakpoint
CREATE INDEX "person_list_age" ON "core"."person" USING btree ("investigation_id","age_band","id") WHERE "core"."person"."withdrawn_at" is null;--> statement-breakpoint
CREATE INDEX "person_list_sex" ON "core"."person" USING btree ("investigation_id","sex","id") WHERE "core"."person"."withdrawn_at" is null;--> statement-breakpoint
CREATE INDEX "person_list_area" ON "core"."person" USING btree ("investigation_id","area","id") WHERE "core"."person"."withdrawn_at" is null;--> statement-breakpoint
CREATE INDEX "person_list_result" ON "core"."person" USING btree ("investigation_id","result","id") WHERE "core"."person"."withdrawn_at" is null;--> statement-breakpoint
CREATE INDEX "person_list_interview" ON "core"."person" USING btree ("investigation_id","interview_state","id") WHERE "core"."person"."withdrawn_at" is null;--> statement-breakpoint
CREATE INDEX "person_household" ON "core"."person" USING btree ("household_id");