ALTER TABLE "datasets" ADD COLUMN "archived_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "datasets" ADD COLUMN "deleted_at" timestamp with time zone;