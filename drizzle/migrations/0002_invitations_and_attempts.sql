CREATE TABLE "auth"."attempt" (
	"key" text PRIMARY KEY NOT NULL,
	"failures" integer NOT NULL,
	"since" timestamp with time zone DEFAULT now() NOT NULL,
	"free_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "auth"."invitation" (
	"id" uuid PRIMARY KEY NOT NULL,
	"token_hash" text NOT NULL,
	"kind" text NOT NULL,
	"email" text NOT NULL,
	"account_id" uuid,
	"investigation_id" uuid,
	"role" text,
	"team_id" uuid,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone,
	"recorded_by" uuid,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "invitation_kind" CHECK ("auth"."invitation"."kind" in ('invitation', 'reset'))
);
--> statement-breakpoint
CREATE TABLE "auth"."mail" (
	"id" uuid PRIMARY KEY NOT NULL,
	"sealed" "bytea" NOT NULL,
	"attempts" smallint DEFAULT 0 NOT NULL,
	"due_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX "invitation_token" ON "auth"."invitation" USING btree ("token_hash");--> statement-breakpoint
CREATE INDEX "invitation_investigation" ON "auth"."invitation" USING btree ("investigation_id");--> statement-breakpoint
CREATE INDEX "invitation_account" ON "auth"."invitation" USING btree ("account_id");--> statement-breakpoint
CREATE INDEX "mail_due" ON "auth"."mail" USING btree ("due_at");