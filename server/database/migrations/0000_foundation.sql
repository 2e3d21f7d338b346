CREATE TABLE "blob_chunks" (
	"blob_id" text NOT NULL,
	"part" integer NOT NULL,
	"data" "bytea" NOT NULL,
	CONSTRAINT "blob_chunks_blob_id_part_pk" PRIMARY KEY("blob_id","part")
);
--> statement-breakpoint
CREATE TABLE "blobs" (
	"id" text PRIMARY KEY NOT NULL,
	"bytes" integer NOT NULL,
	"adopted" boolean NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "installation" (
	"key" text PRIMARY KEY NOT NULL,
	"value" text NOT NULL
);
--> statement-breakpoint
CREATE TABLE "memberships" (
	"workspace_id" text NOT NULL,
	"user_id" text NOT NULL,
	"roles" text[] NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	CONSTRAINT "memberships_workspace_id_user_id_pk" PRIMARY KEY("workspace_id","user_id")
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" text PRIMARY KEY NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "workspaces" (
	"id" text PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "calibrations" (
	"machine_id" text NOT NULL,
	"number" integer NOT NULL,
	"sheet" jsonb NOT NULL,
	"qubits" integer NOT NULL,
	"couplers" integer NOT NULL,
	"broke" jsonb NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	CONSTRAINT "calibrations_machine_id_number_pk" PRIMARY KEY("machine_id","number")
);
--> statement-breakpoint
CREATE TABLE "counters" (
	"scope" text NOT NULL,
	"kind" text NOT NULL,
	"value" integer NOT NULL,
	CONSTRAINT "counters_scope_kind_pk" PRIMARY KEY("scope","kind")
);
--> statement-breakpoint
CREATE TABLE "embeddings" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"problem_id" text NOT NULL,
	"machine_id" text NOT NULL,
	"calibration" integer NOT NULL,
	"number" integer NOT NULL,
	"status" text NOT NULL,
	"method" text NOT NULL,
	"seed" double precision NOT NULL,
	"tries" integer NOT NULL,
	"time_limit_seconds" double precision NOT NULL,
	"chains_blob_id" text,
	"stats" jsonb,
	"unmet" jsonb,
	"reason" text,
	"fingerprint" text,
	"seconds" double precision,
	"version" text NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "jobs" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"kind" text NOT NULL,
	"subject_id" text NOT NULL,
	"status" text NOT NULL,
	"progress" double precision NOT NULL,
	"message" text NOT NULL,
	"detail" jsonb NOT NULL,
	"log" jsonb NOT NULL,
	"attempts" integer NOT NULL,
	"cancel_requested" boolean NOT NULL,
	"worker" text,
	"heartbeat_at" timestamp with time zone,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"started_at" timestamp with time zone,
	"finished_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "machines" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"name" text NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"family" jsonb NOT NULL,
	"calibration" integer NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"changed_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "problems" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"number" integer NOT NULL,
	"name" text NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"form" text NOT NULL,
	"sense" text NOT NULL,
	"variables" integer NOT NULL,
	"interactions" integer NOT NULL,
	"data_blob_id" text NOT NULL,
	"fingerprint" text NOT NULL,
	"source" jsonb NOT NULL,
	"reading" jsonb NOT NULL,
	"structure" jsonb NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"changed_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "returns" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"run_sheet_id" text NOT NULL,
	"number" integer NOT NULL,
	"source" text NOT NULL,
	"status" text NOT NULL,
	"made" jsonb NOT NULL,
	"settings" jsonb NOT NULL,
	"samples_blob_id" text,
	"reads" integer NOT NULL,
	"reads_with_break" integer,
	"best" double precision,
	"reason" text,
	"seconds" double precision,
	"version" text NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "run_sheet_remarks" (
	"id" text PRIMARY KEY NOT NULL,
	"run_sheet_id" text NOT NULL,
	"by" text,
	"what" text NOT NULL,
	"text" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "run_sheets" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"embedding_id" text NOT NULL,
	"number" integer NOT NULL,
	"name" text NOT NULL,
	"state" text NOT NULL,
	"settings" jsonb NOT NULL,
	"fingerprint" text,
	"machine_time_milliseconds" double precision NOT NULL,
	"prepared_by" text NOT NULL,
	"reviewed_by" text,
	"created_at" timestamp with time zone NOT NULL,
	"changed_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
ALTER TABLE "blob_chunks" ADD CONSTRAINT "blob_chunks_blob_id_blobs_id_fk" FOREIGN KEY ("blob_id") REFERENCES "public"."blobs"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibrations" ADD CONSTRAINT "calibrations_machine_id_machines_id_fk" FOREIGN KEY ("machine_id") REFERENCES "public"."machines"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibrations" ADD CONSTRAINT "calibrations_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "embeddings" ADD CONSTRAINT "embeddings_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "embeddings" ADD CONSTRAINT "embeddings_problem_id_problems_id_fk" FOREIGN KEY ("problem_id") REFERENCES "public"."problems"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "embeddings" ADD CONSTRAINT "embeddings_machine_id_machines_id_fk" FOREIGN KEY ("machine_id") REFERENCES "public"."machines"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "embeddings" ADD CONSTRAINT "embeddings_chains_blob_id_blobs_id_fk" FOREIGN KEY ("chains_blob_id") REFERENCES "public"."blobs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "embeddings" ADD CONSTRAINT "embeddings_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "jobs" ADD CONSTRAINT "jobs_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "jobs" ADD CONSTRAINT "jobs_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "machines" ADD CONSTRAINT "machines_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "machines" ADD CONSTRAINT "machines_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "problems" ADD CONSTRAINT "problems_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "problems" ADD CONSTRAINT "problems_data_blob_id_blobs_id_fk" FOREIGN KEY ("data_blob_id") REFERENCES "public"."blobs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "problems" ADD CONSTRAINT "problems_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "returns" ADD CONSTRAINT "returns_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "returns" ADD CONSTRAINT "returns_run_sheet_id_run_sheets_id_fk" FOREIGN KEY ("run_sheet_id") REFERENCES "public"."run_sheets"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "returns" ADD CONSTRAINT "returns_samples_blob_id_blobs_id_fk" FOREIGN KEY ("samples_blob_id") REFERENCES "public"."blobs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "returns" ADD CONSTRAINT "returns_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_sheet_remarks" ADD CONSTRAINT "run_sheet_remarks_run_sheet_id_run_sheets_id_fk" FOREIGN KEY ("run_sheet_id") REFERENCES "public"."run_sheets"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_sheet_remarks" ADD CONSTRAINT "run_sheet_remarks_by_users_id_fk" FOREIGN KEY ("by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_sheets" ADD CONSTRAINT "run_sheets_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_sheets" ADD CONSTRAINT "run_sheets_embedding_id_embeddings_id_fk" FOREIGN KEY ("embedding_id") REFERENCES "public"."embeddings"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_sheets" ADD CONSTRAINT "run_sheets_prepared_by_users_id_fk" FOREIGN KEY ("prepared_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_sheets" ADD CONSTRAINT "run_sheets_reviewed_by_users_id_fk" FOREIGN KEY ("reviewed_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "blobs_adopted_created_at_index" ON "blobs" USING btree ("adopted","created_at");--> statement-breakpoint
CREATE UNIQUE INDEX "users_email_index" ON "users" USING btree ("email");--> statement-breakpoint
CREATE UNIQUE INDEX "embeddings_problem_id_number_index" ON "embeddings" USING btree ("problem_id","number");--> statement-breakpoint
CREATE INDEX "embeddings_workspace_id_index" ON "embeddings" USING btree ("workspace_id");--> statement-breakpoint
CREATE INDEX "embeddings_machine_id_index" ON "embeddings" USING btree ("machine_id");--> statement-breakpoint
CREATE INDEX "jobs_status_index" ON "jobs" USING btree ("status");--> statement-breakpoint
CREATE INDEX "jobs_subject_id_index" ON "jobs" USING btree ("subject_id");--> statement-breakpoint
CREATE UNIQUE INDEX "machines_workspace_id_name_index" ON "machines" USING btree ("workspace_id","name");--> statement-breakpoint
CREATE UNIQUE INDEX "problems_workspace_id_number_index" ON "problems" USING btree ("workspace_id","number");--> statement-breakpoint
CREATE UNIQUE INDEX "returns_run_sheet_id_number_index" ON "returns" USING btree ("run_sheet_id","number");--> statement-breakpoint
CREATE INDEX "run_sheet_remarks_run_sheet_id_created_at_index" ON "run_sheet_remarks" USING btree ("run_sheet_id","created_at");--> statement-breakpoint
CREATE UNIQUE INDEX "run_sheets_workspace_id_number_index" ON "run_sheets" USING btree ("workspace_id","number");--> statement-breakpoint
CREATE INDEX "run_sheets_embedding_id_index" ON "run_sheets" USING btree ("embedding_id");--> statement-breakpoint
ALTER TABLE "blob_chunks" ALTER COLUMN "data" SET STORAGE EXTERNAL;
