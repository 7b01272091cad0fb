CREATE TABLE "core"."follow_end" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"reason" text NOT NULL,
	"day" text NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid,
	"withdrawn_at" timestamp with time zone,
	"withdrawn_by" uuid,
	CONSTRAINT "follow_end_reason" CHECK ("core"."follow_end"."reason" in ('refused','moved','died','not_a_contact'))
);
--> statement-breakpoint
CREATE TABLE "core"."follow_up" (
	"person_id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"day_zero" text,
	"day_key" integer GENERATED ALWAYS AS (coalesce(replace(day_zero, '-', '')::integer, 99991231)) STORED NOT NULL,
	"open" boolean DEFAULT true NOT NULL,
	"symptomatic" boolean DEFAULT false NOT NULL,
	"together" text
);
--> statement-breakpoint
ALTER TABLE "core"."follow_end" ADD CONSTRAINT "follow_end_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."follow_end" ADD CONSTRAINT "follow_end_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "core"."person"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."follow_up" ADD CONSTRAINT "follow_up_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "core"."person"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "follow_end_person" ON "core"."follow_end" USING btree ("person_id","recorded_at");--> statement-breakpoint
CREATE UNIQUE INDEX "follow_end_standing" ON "core"."follow_end" USING btree ("person_id") WHERE "core"."follow_end"."withdrawn_at" is null;--> statement-breakpoint
CREATE INDEX "follow_up_all" ON "core"."follow_up" USING btree ("investigation_id","day_key","person_id");--> statement-breakpoint
CREATE INDEX "follow_up_open" ON "core"."follow_up" USING btree ("investigation_id","day_key","person_id") WHERE "core"."follow_up"."open";--> statement-breakpoint
CREATE INDEX "follow_up_symptoms" ON "core"."follow_up" USING btree ("investigation_id") WHERE "core"."follow_up"."symptomatic" and "core"."follow_up"."open";--> statement-breakpoint
CREATE INDEX "follow_up_together" ON "core"."follow_up" USING btree ("investigation_id","together") WHERE "core"."follow_up"."together" is not null;