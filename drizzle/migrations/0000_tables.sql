CREATE SCHEMA "audit";
--> statement-breakpoint
CREATE SCHEMA "auth";
--> statement-breakpoint
CREATE SCHEMA "core";
--> statement-breakpoint
CREATE SCHEMA "identity";
--> statement-breakpoint
CREATE TABLE "audit"."event" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"investigation_id" uuid,
	"account_id" uuid,
	"role" text,
	"action" text NOT NULL,
	"person_ids" uuid[] DEFAULT '{}'::uuid[] NOT NULL,
	"fields" text[] DEFAULT '{}'::text[] NOT NULL,
	"counts" jsonb DEFAULT '{}'::jsonb NOT NULL
);
--> statement-breakpoint
CREATE TABLE "auth"."account" (
	"id" uuid PRIMARY KEY NOT NULL,
	"email" text NOT NULL,
	"display_name" text NOT NULL,
	"password_hash" text NOT NULL,
	"demo" boolean DEFAULT false NOT NULL,
	"epoch" integer DEFAULT 1 NOT NULL,
	"disabled_at" timestamp with time zone,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "auth"."ctx_live" (
	"nonce" uuid PRIMARY KEY NOT NULL,
	"account_id" uuid NOT NULL,
	"investigation_id" uuid NOT NULL,
	"role" text NOT NULL,
	"expires_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "auth"."field_right" (
	"role" text NOT NULL,
	"field" text NOT NULL,
	CONSTRAINT "field_right_role_field_pk" PRIMARY KEY("role","field")
);
--> statement-breakpoint
CREATE TABLE "auth"."first_officer_link" (
	"token_hash" text PRIMARY KEY NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "auth"."idempotency" (
	"account_id" uuid NOT NULL,
	"key" uuid NOT NULL,
	"route" text NOT NULL,
	"request_hash" text NOT NULL,
	"status" smallint NOT NULL,
	"receipt" jsonb NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "idempotency_account_id_key_pk" PRIMARY KEY("account_id","key")
);
--> statement-breakpoint
CREATE TABLE "auth"."meta" (
	"key" text PRIMARY KEY NOT NULL,
	"value" text NOT NULL
);
--> statement-breakpoint
CREATE TABLE "auth"."session" (
	"sid" text PRIMARY KEY NOT NULL,
	"sess" json NOT NULL,
	"expire" timestamp with time zone NOT NULL,
	"account_id" uuid
);
--> statement-breakpoint
CREATE TABLE "core"."import" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"sha256" text NOT NULL,
	"state" text NOT NULL,
	"row_count" integer DEFAULT 0 NOT NULL,
	"counts" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"problems" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"progress" real DEFAULT 0 NOT NULL,
	"create_missing" boolean DEFAULT false NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid,
	"committed_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "identity"."import_stage" (
	"import_id" uuid NOT NULL,
	"investigation_id" uuid NOT NULL,
	"chunk" integer NOT NULL,
	"body_cipher" "bytea" NOT NULL,
	CONSTRAINT "import_stage_import_id_chunk_pk" PRIMARY KEY("import_id","chunk")
);
--> statement-breakpoint
CREATE TABLE "core"."contact_pair" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"person_a" uuid NOT NULL,
	"person_b" uuid NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"withdrawn_at" timestamp with time zone,
	CONSTRAINT "contact_pair_order" CHECK ("core"."contact_pair"."person_a" < "core"."contact_pair"."person_b")
);
--> statement-breakpoint
CREATE TABLE "core"."exposure" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"pair_id" uuid NOT NULL,
	"interview_id" uuid,
	"import_id" uuid,
	"named_by" uuid,
	"first_exposure" text,
	"last_exposure" text,
	"setting" text,
	"place_id" uuid,
	"minutes" integer,
	"minutes_missing" text,
	"distance_m" real,
	"distance_missing" text,
	"physical" text,
	"indoors" text,
	"relation" text,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid,
	"withdrawn_at" timestamp with time zone,
	CONSTRAINT "exposure_setting_known" CHECK ("core"."exposure"."setting" in ('household','workplace','school','health_care','social','transport','other','unknown','refused'))
);
--> statement-breakpoint
CREATE TABLE "core"."group_exposure" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"interview_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"setting" text,
	"place_id" uuid,
	"first_exposure" text,
	"last_exposure" text,
	"count_min" integer,
	"count_max" integer,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid,
	"withdrawn_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "core"."interview" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"outcome" text NOT NULL,
	"channel" text,
	"held_at" timestamp with time zone NOT NULL,
	"day" text NOT NULL,
	"source" text DEFAULT 'form' NOT NULL,
	"graph_version" bigint,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid,
	"withdrawn_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "identity"."interview_draft" (
	"person_id" uuid NOT NULL,
	"account_id" uuid NOT NULL,
	"investigation_id" uuid NOT NULL,
	"body_cipher" "bytea" NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "interview_draft_person_id_account_id_pk" PRIMARY KEY("person_id","account_id")
);
--> statement-breakpoint
CREATE TABLE "core"."case_definition" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"wording" text NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid
);
--> statement-breakpoint
CREATE TABLE "core"."graph_change" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "core"."graph_change_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"investigation_id" uuid NOT NULL,
	"graph_version" bigint NOT NULL,
	"kind" text NOT NULL,
	"person_a" uuid,
	"person_b" uuid,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "core"."investigation" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"invented" boolean DEFAULT false NOT NULL,
	"time_zone" text NOT NULL,
	"country_code" text NOT NULL,
	"population_at_risk" integer,
	"infectious_before" integer NOT NULL,
	"infectious_after" integer NOT NULL,
	"incubation_min" integer NOT NULL,
	"incubation_max" integer NOT NULL,
	"monitoring_days" integer NOT NULL,
	"case_definition_version" integer DEFAULT 1 NOT NULL,
	"graph_version" bigint DEFAULT 0 NOT NULL,
	"next_number" integer DEFAULT 1 NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid
);
--> statement-breakpoint
CREATE TABLE "core"."member" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"account_id" uuid NOT NULL,
	"role" text NOT NULL,
	"team_id" uuid,
	"since" timestamp with time zone DEFAULT now() NOT NULL,
	"ended_at" timestamp with time zone,
	"recorded_by" uuid,
	CONSTRAINT "member_role" CHECK ("core"."member"."role" in ('tracer','supervisor','epidemiologist','officer'))
);
--> statement-breakpoint
CREATE TABLE "core"."outbox" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "core"."outbox_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"investigation_id" uuid NOT NULL,
	"topic" text NOT NULL,
	"entity_id" uuid,
	"graph_version" bigint,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"done_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "core"."team" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"name" text NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "core"."classification" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"classification" text NOT NULL,
	"case_definition_version" integer NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid
);
--> statement-breakpoint
CREATE TABLE "identity"."data_key" (
	"investigation_id" uuid PRIMARY KEY NOT NULL,
	"wrapped_key" "bytea" NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "identity"."person" (
	"person_id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"ref_cipher" "bytea",
	"ref_token" "bytea",
	"name_cipher" "bytea",
	"name_masked" text,
	"phone_cipher" "bytea",
	"phone_last2" text,
	"email_cipher" "bytea",
	"email_masked" text,
	"birth_date_cipher" "bytea",
	"birth_year" integer,
	"address_cipher" "bytea",
	"note_cipher" "bytea"
);
--> statement-breakpoint
CREATE TABLE "identity"."place" (
	"place_id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"name_cipher" "bytea" NOT NULL,
	"name_token" "bytea" NOT NULL
);
--> statement-breakpoint
CREATE TABLE "core"."match_review" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"other_id" uuid NOT NULL,
	"matched_on" text[] NOT NULL,
	"state" text DEFAULT 'open' NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid
);
--> statement-breakpoint
CREATE TABLE "core"."person" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"study_number" text NOT NULL,
	"sex" text,
	"age_band" text,
	"area" text,
	"occupation" text,
	"household_id" uuid,
	"classification" text,
	"case_definition_version" integer DEFAULT 1 NOT NULL,
	"onset_date" text,
	"specimen_date" text,
	"result_date" text,
	"result" text,
	"report_date" text,
	"interview_date" text,
	"interviewed" text,
	"interview_state" text,
	"isolation_date" text,
	"outcome" text,
	"outcome_date" text,
	"became_case" boolean DEFAULT false NOT NULL,
	"assigned_account_id" uuid,
	"assigned_team_id" uuid,
	"source" text DEFAULT 'form' NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"withdrawn_at" timestamp with time zone,
	CONSTRAINT "person_classification_known" CHECK ("core"."person"."classification" in ('confirmed','probable','suspected','not_a_case','contact'))
);
--> statement-breakpoint
CREATE TABLE "core"."place" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"name" text,
	"setting" text,
	"area" text,
	"version" integer DEFAULT 1 NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid
);
--> statement-breakpoint
CREATE TABLE "identity"."search_token" (
	"person_id" uuid NOT NULL,
	"investigation_id" uuid NOT NULL,
	"kind" smallint NOT NULL,
	"token" "bytea" NOT NULL,
	CONSTRAINT "search_token_investigation_id_token_kind_person_id_pk" PRIMARY KEY("investigation_id","token","kind","person_id")
);
--> statement-breakpoint
CREATE TABLE "core"."test_result" (
	"id" uuid PRIMARY KEY NOT NULL,
	"investigation_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"specimen_date" text,
	"kind" text,
	"result" text,
	"result_date" text,
	"result_at" timestamp with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid,
	"withdrawn_at" timestamp with time zone
);
--> statement-breakpoint
ALTER TABLE "core"."import" ADD CONSTRAINT "import_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "identity"."import_stage" ADD CONSTRAINT "import_stage_import_id_import_id_fk" FOREIGN KEY ("import_id") REFERENCES "core"."import"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."contact_pair" ADD CONSTRAINT "contact_pair_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."contact_pair" ADD CONSTRAINT "contact_pair_person_a_person_id_fk" FOREIGN KEY ("person_a") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."contact_pair" ADD CONSTRAINT "contact_pair_person_b_person_id_fk" FOREIGN KEY ("person_b") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."exposure" ADD CONSTRAINT "exposure_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."exposure" ADD CONSTRAINT "exposure_pair_id_contact_pair_id_fk" FOREIGN KEY ("pair_id") REFERENCES "core"."contact_pair"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."exposure" ADD CONSTRAINT "exposure_interview_id_interview_id_fk" FOREIGN KEY ("interview_id") REFERENCES "core"."interview"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."exposure" ADD CONSTRAINT "exposure_named_by_person_id_fk" FOREIGN KEY ("named_by") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."exposure" ADD CONSTRAINT "exposure_place_id_place_id_fk" FOREIGN KEY ("place_id") REFERENCES "core"."place"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."group_exposure" ADD CONSTRAINT "group_exposure_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."group_exposure" ADD CONSTRAINT "group_exposure_interview_id_interview_id_fk" FOREIGN KEY ("interview_id") REFERENCES "core"."interview"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."group_exposure" ADD CONSTRAINT "group_exposure_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."group_exposure" ADD CONSTRAINT "group_exposure_place_id_place_id_fk" FOREIGN KEY ("place_id") REFERENCES "core"."place"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."interview" ADD CONSTRAINT "interview_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."interview" ADD CONSTRAINT "interview_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "identity"."interview_draft" ADD CONSTRAINT "interview_draft_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."case_definition" ADD CONSTRAINT "case_definition_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."graph_change" ADD CONSTRAINT "graph_change_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."member" ADD CONSTRAINT "member_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."member" ADD CONSTRAINT "member_team_id_team_id_fk" FOREIGN KEY ("team_id") REFERENCES "core"."team"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."team" ADD CONSTRAINT "team_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."classification" ADD CONSTRAINT "classification_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."classification" ADD CONSTRAINT "classification_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "identity"."data_key" ADD CONSTRAINT "data_key_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "identity"."person" ADD CONSTRAINT "person_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "identity"."place" ADD CONSTRAINT "place_place_id_place_id_fk" FOREIGN KEY ("place_id") REFERENCES "core"."place"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."match_review" ADD CONSTRAINT "match_review_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."match_review" ADD CONSTRAINT "match_review_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."match_review" ADD CONSTRAINT "match_review_other_id_person_id_fk" FOREIGN KEY ("other_id") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."person" ADD CONSTRAINT "person_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."person" ADD CONSTRAINT "person_household_id_place_id_fk" FOREIGN KEY ("household_id") REFERENCES "core"."place"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."person" ADD CONSTRAINT "person_assigned_team_id_team_id_fk" FOREIGN KEY ("assigned_team_id") REFERENCES "core"."team"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."place" ADD CONSTRAINT "place_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "identity"."search_token" ADD CONSTRAINT "search_token_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."test_result" ADD CONSTRAINT "test_result_investigation_id_investigation_id_fk" FOREIGN KEY ("investigation_id") REFERENCES "core"."investigation"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "core"."test_result" ADD CONSTRAINT "test_result_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "core"."person"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "event_investigation_at" ON "audit"."event" USING btree ("investigation_id","at" DESC NULLS LAST);--> statement-breakpoint
CREATE INDEX "event_persons" ON "audit"."event" USING gin ("person_ids");--> statement-breakpoint
CREATE UNIQUE INDEX "account_email" ON "auth"."account" USING btree (lower("email"));--> statement-breakpoint
CREATE INDEX "ctx_live_account" ON "auth"."ctx_live" USING btree ("account_id");--> statement-breakpoint
CREATE INDEX "ctx_live_expires" ON "auth"."ctx_live" USING btree ("expires_at");--> statement-breakpoint
CREATE INDEX "idempotency_age" ON "auth"."idempotency" USING btree ("recorded_at");--> statement-breakpoint
CREATE INDEX "session_expire" ON "auth"."session" USING btree ("expire");--> statement-breakpoint
CREATE INDEX "session_account" ON "auth"."session" USING btree ("account_id");--> statement-breakpoint
CREATE UNIQUE INDEX "import_file" ON "core"."import" USING btree ("investigation_id","kind","sha256");--> statement-breakpoint
CREATE UNIQUE INDEX "contact_pair_people" ON "core"."contact_pair" USING btree ("investigation_id","person_a","person_b");--> statement-breakpoint
CREATE INDEX "contact_pair_a" ON "core"."contact_pair" USING btree ("person_a");--> statement-breakpoint
CREATE INDEX "contact_pair_b" ON "core"."contact_pair" USING btree ("person_b");--> statement-breakpoint
CREATE INDEX "exposure_pair" ON "core"."exposure" USING btree ("pair_id");--> statement-breakpoint
CREATE INDEX "exposure_interview" ON "core"."exposure" USING btree ("interview_id");--> statement-breakpoint
CREATE INDEX "exposure_place" ON "core"."exposure" USING btree ("place_id");--> statement-breakpoint
CREATE INDEX "exposure_investigation" ON "core"."exposure" USING btree ("investigation_id");--> statement-breakpoint
CREATE INDEX "group_exposure_person" ON "core"."group_exposure" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "group_exposure_interview" ON "core"."group_exposure" USING btree ("interview_id");--> statement-breakpoint
CREATE INDEX "interview_person" ON "core"."interview" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "interview_investigation" ON "core"."interview" USING btree ("investigation_id","recorded_at");--> statement-breakpoint
CREATE UNIQUE INDEX "case_definition_number" ON "core"."case_definition" USING btree ("investigation_id","number");--> statement-breakpoint
CREATE INDEX "graph_change_version" ON "core"."graph_change" USING btree ("investigation_id","graph_version");--> statement-breakpoint
CREATE UNIQUE INDEX "member_live" ON "core"."member" USING btree ("investigation_id","account_id","role") WHERE "core"."member"."ended_at" is null;--> statement-breakpoint
CREATE INDEX "member_account" ON "core"."member" USING btree ("account_id");--> statement-breakpoint
CREATE INDEX "outbox_undone" ON "core"."outbox" USING btree ("id") WHERE "core"."outbox"."done_at" is null;--> statement-breakpoint
CREATE INDEX "classification_person" ON "core"."classification" USING btree ("person_id","recorded_at");--> statement-breakpoint
CREATE INDEX "classification_investigation" ON "core"."classification" USING btree ("investigation_id");--> statement-breakpoint
CREATE UNIQUE INDEX "identity_person_ref" ON "identity"."person" USING btree ("investigation_id","ref_token");--> statement-breakpoint
CREATE UNIQUE INDEX "identity_place_name" ON "identity"."place" USING btree ("investigation_id","name_token");--> statement-breakpoint
CREATE UNIQUE INDEX "match_review_pair" ON "core"."match_review" USING btree ("person_id","other_id");--> statement-breakpoint
CREATE UNIQUE INDEX "person_study_number" ON "core"."person" USING btree ("investigation_id","study_number");--> statement-breakpoint
CREATE INDEX "person_recorded" ON "core"."person" USING btree ("investigation_id","recorded_at","id");--> statement-breakpoint
CREATE INDEX "person_classification" ON "core"."person" USING btree ("investigation_id","classification","id");--> statement-breakpoint
CREATE INDEX "person_onset" ON "core"."person" USING btree ("investigation_id","onset_date","id");--> statement-breakpoint
CREATE INDEX "person_report" ON "core"."person" USING btree ("investigation_id","report_date","id");--> statement-breakpoint
CREATE INDEX "person_assigned" ON "core"."person" USING btree ("assigned_account_id");--> statement-breakpoint
CREATE INDEX "person_team" ON "core"."person" USING btree ("assigned_team_id");--> statement-breakpoint
CREATE UNIQUE INDEX "place_number" ON "core"."place" USING btree ("investigation_id","number");--> statement-breakpoint
CREATE INDEX "place_name" ON "core"."place" USING btree ("investigation_id",lower("name"));--> statement-breakpoint
CREATE INDEX "search_token_person" ON "identity"."search_token" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "test_result_person" ON "core"."test_result" USING btree ("person_id");