ALTER TYPE "public"."outbox_kind" ADD VALUE 'estimate';--> statement-breakpoint
CREATE TABLE "revision_estimates" (
	"workspace_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"max_dimension" integer NOT NULL,
	"estimate" jsonb,
	"failure" text,
	"tries" integer DEFAULT 0 NOT NULL,
	"dispatched_at" timestamp with time zone DEFAULT now() NOT NULL,
	"asked_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "revision_estimates_workspace_id_revision_id_max_dimension_pk" PRIMARY KEY("workspace_id","revision_id","max_dimension")
);
--> statement-breakpoint
ALTER TABLE "revision_estimates" ADD CONSTRAINT "revision_estimates_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE cascade ON UPDATE no action;