ALTER TYPE "public"."outbox_kind" ADD VALUE 'beat';--> statement-breakpoint
CREATE TABLE "beats" (
	"name" text PRIMARY KEY NOT NULL,
	"consumed_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "runs" ALTER COLUMN "engine_version" SET DEFAULT '';--> statement-breakpoint
ALTER TABLE "outbox" ALTER COLUMN "workspace_id" DROP NOT NULL;--> statement-breakpoint
ALTER TABLE "runs" ADD COLUMN "dispatch_id" uuid DEFAULT gen_random_uuid() NOT NULL;--> statement-breakpoint
ALTER TABLE "runs" ADD COLUMN "dispatched_at" timestamp with time zone DEFAULT now() NOT NULL;--> statement-breakpoint
ALTER TABLE "pair_details" ADD COLUMN "tries" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "pair_details" ADD COLUMN "dispatched_at" timestamp with time zone DEFAULT now() NOT NULL;--> statement-breakpoint
ALTER TABLE "mails" ADD COLUMN "tries" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "mails" ADD COLUMN "dispatched_at" timestamp with time zone DEFAULT now() NOT NULL;