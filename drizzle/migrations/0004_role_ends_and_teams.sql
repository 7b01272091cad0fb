ALTER TABLE "auth"."invitation" ADD COLUMN "ends_on" text;--> statement-breakpoint
ALTER TABLE "core"."member" ADD COLUMN "ends_on" text;--> statement-breakpoint
ALTER TABLE "core"."member" ADD COLUMN "version" integer DEFAULT 1 NOT NULL;--> statement-breakpoint
ALTER TABLE "core"."team" ADD COLUMN "version" integer DEFAULT 1 NOT NULL;--> statement-breakpoint
ALTER TABLE "core"."team" ADD COLUMN "removed_at" timestamp with time zone;