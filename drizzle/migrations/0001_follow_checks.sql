CREATE TABLE "core"."follow_check" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"day" text NOT NULL,
	"outcome" text NOT NULL,
	"symptoms" text,
	"symptom_codes" text[] DEFAULT '{}' NOT NULL,
	"respondent" text,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid,
	"withdrawn_at" timestamp with time zone,
	CONSTRAINT "follow_check_outcome" CHECK ("core"."follow_check"."outcome" in ('seen','spoken','message','not_reached')),
	CONSTRAINT "follow_check_symptoms_known" CHECK ("core"."follow_check"."symptoms" in ('yes','no','unknown','refused'))
);
--> statement-breakpoint
CREATE TABLE "identity"."follow_check" (
	"check_id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"note_cipher" "bytea" NOT NULL
);
--> statement-breakpoint
ALTER TABLE "core"."investigation" ADD COLUMN "lost_after_days" integer DEFAULT 3 NOT NULL;--> statement-breakpoint
ALTER TABLE "core"."follow_check" ADD CONSTRAINT "follow_check_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."follow_check" ADD CONSTRAINT "follow_check_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "identity"."follow_check" ADD CONSTRAINT "follow_check_check_id_follow_check_id_fk" FOREIGN KEY ("check_id") REFERENCES "core"."follow_check"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "follow_check_person" ON "core"."follow_check" USING btree ("person_id","day");--> statement-breakpoint
CREATE INDEX "follow_check_symptoms" ON "core"."follow_check" USING btree ("investigation_id","person_id","day") WHERE "core"."follow_check"."symptoms" = 'yes' and "core"."follow_check"."withdrawn_at" is null;