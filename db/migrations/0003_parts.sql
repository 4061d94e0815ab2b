ALTER TYPE "public"."outbox_kind" ADD VALUE 'focus';--> statement-breakpoint
ALTER TABLE "beats" ADD COLUMN "engine_version" text;--> statement-breakpoint
ALTER TABLE "runs" ADD COLUMN "part" jsonb DEFAULT '{"kind":"whole"}'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "runs" ADD COLUMN "extended_from" jsonb;--> statement-breakpoint
ALTER TABLE "runs" ADD COLUMN "blocks_before" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "runs" ADD COLUMN "pairs_before" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "runs" ADD COLUMN "focus" jsonb;--> statement-breakpoint
ALTER TABLE "runs" ADD COLUMN "seconds_spent" double precision DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "run_blocks" ADD COLUMN "partners" "bytea";--> statement-breakpoint
ALTER TABLE "run_blocks" ADD COLUMN "cost" double precision DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "run_blocks" ADD COLUMN "stored_by" text;--> statement-breakpoint
CREATE INDEX "runs_of_revision" ON "runs" USING btree ("revision_id");--> statement-breakpoint
-- Answers hold for an hour and are counted again: those of another layout are left out.
DELETE FROM "revision_estimates";--> statement-breakpoint
ALTER TABLE "revision_estimates" DROP CONSTRAINT "revision_estimates_workspace_id_revision_id_max_dimension_pk";--> statement-breakpoint
ALTER TABLE "revision_estimates" ADD COLUMN "part_key" text NOT NULL;--> statement-breakpoint
ALTER TABLE "revision_estimates" ADD COLUMN "part" jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "revision_estimates" ADD CONSTRAINT "revision_estimates_pk" PRIMARY KEY("workspace_id","revision_id","max_dimension","part_key");
