CREATE TYPE "public"."import_state" AS ENUM('open', 'saved');--> statement-breakpoint
ALTER TYPE "public"."outbox_kind" ADD VALUE 'import_estimate' BEFORE 'focus';--> statement-breakpoint
CREATE TABLE "column_memory" (
	"workspace_id" uuid NOT NULL,
	"signature" text NOT NULL,
	"choices" jsonb NOT NULL,
	"updated_by" uuid,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "column_memory_pk" PRIMARY KEY("workspace_id","signature")
);
--> statement-breakpoint
CREATE TABLE "import_estimates" (
	"workspace_id" uuid NOT NULL,
	"import_id" uuid NOT NULL,
	"version" integer NOT NULL,
	"entries" "bytea" NOT NULL,
	"edges" "bytea" NOT NULL,
	"estimate" jsonb,
	"failure" text,
	"tries" integer DEFAULT 0 NOT NULL,
	"dispatched_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "import_estimates_pk" PRIMARY KEY("import_id")
);
--> statement-breakpoint
CREATE TABLE "import_files" (
	"workspace_id" uuid NOT NULL,
	"import_id" uuid NOT NULL,
	"position" integer NOT NULL,
	"name" text NOT NULL,
	"bytes" integer NOT NULL,
	"pasted" boolean NOT NULL,
	"hint" jsonb DEFAULT '{}'::jsonb NOT NULL,
	CONSTRAINT "import_files_pk" PRIMARY KEY("import_id","position"),
	CONSTRAINT "import_files_workspace" UNIQUE("workspace_id","import_id","position")
);
--> statement-breakpoint
CREATE TABLE "import_pieces" (
	"workspace_id" uuid NOT NULL,
	"import_id" uuid NOT NULL,
	"position" integer NOT NULL,
	"piece" integer NOT NULL,
	"content" "bytea" NOT NULL,
	CONSTRAINT "import_pieces_pk" PRIMARY KEY("import_id","position","piece")
);
--> statement-breakpoint
CREATE TABLE "imports" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"workspace_id" uuid NOT NULL,
	"name" text NOT NULL,
	"state" "import_state" DEFAULT 'open' NOT NULL,
	"dataset_id" uuid,
	"revision_id" uuid,
	"version" integer DEFAULT 1 NOT NULL,
	"choices" jsonb,
	"read_version" integer,
	"view" jsonb,
	"weights" jsonb,
	"created_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	CONSTRAINT "imports_workspace_id" UNIQUE("workspace_id","id")
);
--> statement-breakpoint
CREATE TABLE "staged_pieces" (
	"stage" uuid NOT NULL,
	"piece" integer NOT NULL,
	"content" "bytea" NOT NULL,
	CONSTRAINT "staged_pieces_pk" PRIMARY KEY("stage","piece")
);
--> statement-breakpoint
ALTER TABLE "revisions" ADD COLUMN "weights" "bytea";--> statement-breakpoint
ALTER TABLE "column_memory" ADD CONSTRAINT "column_memory_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "column_memory" ADD CONSTRAINT "column_memory_updated_by_users_id_fk" FOREIGN KEY ("updated_by") REFERENCES "public"."users"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "import_estimates" ADD CONSTRAINT "import_estimates_import" FOREIGN KEY ("workspace_id","import_id") REFERENCES "public"."imports"("workspace_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "import_files" ADD CONSTRAINT "import_files_import" FOREIGN KEY ("workspace_id","import_id") REFERENCES "public"."imports"("workspace_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "import_pieces" ADD CONSTRAINT "import_pieces_file" FOREIGN KEY ("workspace_id","import_id","position") REFERENCES "public"."import_files"("workspace_id","import_id","position") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "imports" ADD CONSTRAINT "imports_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "imports" ADD CONSTRAINT "imports_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "imports" ADD CONSTRAINT "imports_workspace_id_dataset_id_datasets_workspace_id_id_fk" FOREIGN KEY ("workspace_id","dataset_id") REFERENCES "public"."datasets"("workspace_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "imports" ADD CONSTRAINT "imports_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "imports_expires" ON "imports" USING btree ("expires_at");