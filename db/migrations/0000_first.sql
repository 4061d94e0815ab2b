CREATE TYPE "public"."entry_unit" AS ENUM('number', 'days', 'seconds');--> statement-breakpoint
CREATE TYPE "public"."group_origin" AS ENUM('community', 'hand');--> statement-breakpoint
CREATE TYPE "public"."outbox_kind" AS ENUM('plan', 'blocks', 'pair', 'mail');--> statement-breakpoint
CREATE TYPE "public"."role" AS ENUM('owner', 'analyst', 'recorder', 'reviewer');--> statement-breakpoint
CREATE TYPE "public"."run_state" AS ENUM('queued', 'running', 'done', 'failed', 'stopped');--> statement-breakpoint
CREATE TYPE "public"."scale" AS ENUM('entry', 'rank');--> statement-breakpoint
CREATE TABLE "datasets" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"workspace_id" uuid NOT NULL,
	"name" text NOT NULL,
	"description" text DEFAULT '' NOT NULL,
	"invented" boolean DEFAULT false NOT NULL,
	"created_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "datasets_workspace_id" UNIQUE("workspace_id","id")
);
--> statement-breakpoint
CREATE TABLE "groups" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"workspace_id" uuid NOT NULL,
	"run_id" uuid NOT NULL,
	"name" text NOT NULL,
	"node_ids" text[] NOT NULL,
	"origin" "group_origin" NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"created_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "groups_workspace_id" UNIQUE("workspace_id","id")
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"email" text NOT NULL,
	"email_key" text NOT NULL,
	"password_hash" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" text PRIMARY KEY NOT NULL,
	"user_id" uuid NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "workspaces" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "memberships" (
	"workspace_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"role" "role" NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "memberships_workspace_id_user_id_pk" PRIMARY KEY("workspace_id","user_id")
);
--> statement-breakpoint
CREATE TABLE "revisions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"workspace_id" uuid NOT NULL,
	"dataset_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"content_hash" text NOT NULL,
	"node_count" integer NOT NULL,
	"edge_count" integer NOT NULL,
	"entry_unit" "entry_unit" NOT NULL,
	"edges" "bytea" NOT NULL,
	"report" jsonb NOT NULL,
	"created_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "revisions_workspace_id" UNIQUE("workspace_id","id"),
	CONSTRAINT "revisions_dataset_number" UNIQUE("dataset_id","number")
);
--> statement-breakpoint
CREATE TABLE "revision_nodes" (
	"workspace_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"row" integer NOT NULL,
	"node_id" text NOT NULL,
	"label" text NOT NULL,
	"entry_raw" text NOT NULL,
	"entry" double precision NOT NULL,
	"earliest_raw" text DEFAULT '' NOT NULL,
	"earliest" double precision,
	"latest_raw" text DEFAULT '' NOT NULL,
	"latest" double precision,
	CONSTRAINT "revision_nodes_revision_id_row_pk" PRIMARY KEY("revision_id","row")
);
--> statement-breakpoint
CREATE TABLE "runs" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"workspace_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"scale" "scale" NOT NULL,
	"dimensions" integer[] NOT NULL,
	"engine_version" text NOT NULL,
	"state" "run_state" DEFAULT 'queued' NOT NULL,
	"attempt" integer DEFAULT 0 NOT NULL,
	"pairs_total" integer NOT NULL,
	"block_count" integer,
	"blocks_done" integer DEFAULT 0 NOT NULL,
	"pairs_done" integer DEFAULT 0 NOT NULL,
	"barcode" "bytea",
	"heartbeat_at" timestamp with time zone,
	"failure_code" text,
	"failure_message" text,
	"estimate" jsonb,
	"idempotency_key" text,
	"requested_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"started_at" timestamp with time zone,
	"finished_at" timestamp with time zone,
	CONSTRAINT "runs_workspace_id" UNIQUE("workspace_id","id"),
	CONSTRAINT "runs_workspace_number" UNIQUE("workspace_id","number")
);
--> statement-breakpoint
CREATE TABLE "run_blocks" (
	"workspace_id" uuid NOT NULL,
	"run_id" uuid NOT NULL,
	"block" integer NOT NULL,
	"pairs" integer NOT NULL,
	"rows" "bytea" NOT NULL,
	"result" "bytea",
	"landed" integer,
	"attempt" integer,
	"finished_at" timestamp with time zone,
	CONSTRAINT "run_blocks_run_id_block_pk" PRIMARY KEY("run_id","block")
);
--> statement-breakpoint
CREATE TABLE "pair_details" (
	"workspace_id" uuid NOT NULL,
	"run_id" uuid NOT NULL,
	"p" integer NOT NULL,
	"q" integer NOT NULL,
	"detail" jsonb,
	"failure" text,
	"asked_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "pair_details_run_id_p_q_pk" PRIMARY KEY("run_id","p","q")
);
--> statement-breakpoint
CREATE TABLE "outbox" (
	"id" bigserial PRIMARY KEY NOT NULL,
	"kind" "outbox_kind" NOT NULL,
	"workspace_id" uuid NOT NULL,
	"payload" jsonb NOT NULL,
	"dispatch_id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"tries" integer DEFAULT 0 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "mails" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"workspace_id" uuid NOT NULL,
	"recipient" text NOT NULL,
	"subject" text NOT NULL,
	"body" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"sent_at" timestamp with time zone,
	"note" text
);
--> statement-breakpoint
ALTER TABLE "datasets" ADD CONSTRAINT "datasets_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "datasets" ADD CONSTRAINT "datasets_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "groups" ADD CONSTRAINT "groups_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "groups" ADD CONSTRAINT "groups_workspace_id_run_id_runs_workspace_id_id_fk" FOREIGN KEY ("workspace_id","run_id") REFERENCES "public"."runs"("workspace_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "revisions" ADD CONSTRAINT "revisions_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "revisions" ADD CONSTRAINT "revisions_workspace_id_dataset_id_datasets_workspace_id_id_fk" FOREIGN KEY ("workspace_id","dataset_id") REFERENCES "public"."datasets"("workspace_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "revision_nodes" ADD CONSTRAINT "revision_nodes_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "runs" ADD CONSTRAINT "runs_requested_by_users_id_fk" FOREIGN KEY ("requested_by") REFERENCES "public"."users"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "runs" ADD CONSTRAINT "runs_workspace_id_revision_id_revisions_workspace_id_id_fk" FOREIGN KEY ("workspace_id","revision_id") REFERENCES "public"."revisions"("workspace_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_blocks" ADD CONSTRAINT "run_blocks_workspace_id_run_id_runs_workspace_id_id_fk" FOREIGN KEY ("workspace_id","run_id") REFERENCES "public"."runs"("workspace_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "pair_details" ADD CONSTRAINT "pair_details_workspace_id_run_id_runs_workspace_id_id_fk" FOREIGN KEY ("workspace_id","run_id") REFERENCES "public"."runs"("workspace_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "users_email_key" ON "users" USING btree ("email_key");--> statement-breakpoint
CREATE INDEX "sessions_user" ON "sessions" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "memberships_user" ON "memberships" USING btree ("user_id");--> statement-breakpoint
CREATE UNIQUE INDEX "runs_idempotency" ON "runs" USING btree ("workspace_id","requested_by","idempotency_key");--> statement-breakpoint
CREATE INDEX "runs_unfinished" ON "runs" USING btree ("state","heartbeat_at");--> statement-breakpoint
CREATE INDEX "outbox_created" ON "outbox" USING btree ("created_at");