CREATE TABLE "problem_versions" (
	"problem_id" text NOT NULL,
	"version" integer NOT NULL,
	"remark" text DEFAULT '' NOT NULL,
	"form" text NOT NULL,
	"sense" text NOT NULL,
	"variables" integer NOT NULL,
	"interactions" integer NOT NULL,
	"data_blob_id" text NOT NULL,
	"fingerprint" text NOT NULL,
	"source" jsonb NOT NULL,
	"reading" jsonb NOT NULL,
	"structure" jsonb NOT NULL,
	"groups" jsonb,
	"version_by" text NOT NULL,
	"version_at" timestamp with time zone NOT NULL,
	CONSTRAINT "problem_versions_problem_id_version_pk" PRIMARY KEY("problem_id","version")
);
--> statement-breakpoint
CREATE TABLE "reductions" (
	"problem_id" text PRIMARY KEY NOT NULL,
	"source_id" text,
	"source_version" integer NOT NULL,
	"blob_id" text NOT NULL,
	"summary" jsonb NOT NULL,
	"seconds" double precision NOT NULL,
	"version" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "reference_optima" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"problem_id" text NOT NULL,
	"problem_version" integer NOT NULL,
	"status" text NOT NULL,
	"energy" double precision,
	"bound" double precision,
	"proved" boolean DEFAULT false NOT NULL,
	"state_blob_id" text,
	"method" text,
	"detail" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"settings" jsonb NOT NULL,
	"reason" text,
	"seconds" double precision,
	"version" text NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
ALTER TABLE "problems" DROP CONSTRAINT "problems_data_blob_id_blobs_id_fk";
--> statement-breakpoint
ALTER TABLE "embeddings" ADD COLUMN "problem_version" integer DEFAULT 1 NOT NULL;--> statement-breakpoint
ALTER TABLE "problems" ADD COLUMN "tags" jsonb DEFAULT '[]'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "problems" ADD COLUMN "current_version" integer DEFAULT 1 NOT NULL;--> statement-breakpoint
ALTER TABLE "problem_versions" ADD CONSTRAINT "problem_versions_problem_id_problems_id_fk" FOREIGN KEY ("problem_id") REFERENCES "public"."problems"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "problem_versions" ADD CONSTRAINT "problem_versions_data_blob_id_blobs_id_fk" FOREIGN KEY ("data_blob_id") REFERENCES "public"."blobs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "problem_versions" ADD CONSTRAINT "problem_versions_version_by_users_id_fk" FOREIGN KEY ("version_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reductions" ADD CONSTRAINT "reductions_problem_id_problems_id_fk" FOREIGN KEY ("problem_id") REFERENCES "public"."problems"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reductions" ADD CONSTRAINT "reductions_source_id_problems_id_fk" FOREIGN KEY ("source_id") REFERENCES "public"."problems"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reductions" ADD CONSTRAINT "reductions_blob_id_blobs_id_fk" FOREIGN KEY ("blob_id") REFERENCES "public"."blobs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reference_optima" ADD CONSTRAINT "reference_optima_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reference_optima" ADD CONSTRAINT "reference_optima_problem_id_problems_id_fk" FOREIGN KEY ("problem_id") REFERENCES "public"."problems"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reference_optima" ADD CONSTRAINT "reference_optima_state_blob_id_blobs_id_fk" FOREIGN KEY ("state_blob_id") REFERENCES "public"."blobs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reference_optima" ADD CONSTRAINT "reference_optima_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "reductions_source_id_index" ON "reductions" USING btree ("source_id");--> statement-breakpoint
CREATE INDEX "reference_optima_problem_id_problem_version_index" ON "reference_optima" USING btree ("problem_id","problem_version");--> statement-breakpoint
CREATE INDEX "problems_workspace_id_changed_at_index" ON "problems" USING btree ("workspace_id","changed_at");--> statement-breakpoint
CREATE INDEX "problems_workspace_id_name_index" ON "problems" USING btree ("workspace_id","name");--> statement-breakpoint
INSERT INTO "problem_versions" ("problem_id", "version", "form", "sense", "variables", "interactions", "data_blob_id", "fingerprint", "source", "reading", "structure", "version_by", "version_at")
SELECT "id", 1, "form", "sense", "variables", "interactions", "data_blob_id", "fingerprint", "source", "reading", "structure", "created_by", "created_at" FROM "problems";--> statement-breakpoint
ALTER TABLE "problems" DROP COLUMN "form";--> statement-breakpoint
ALTER TABLE "problems" DROP COLUMN "sense";--> statement-breakpoint
ALTER TABLE "problems" DROP COLUMN "variables";--> statement-breakpoint
ALTER TABLE "problems" DROP COLUMN "interactions";--> statement-breakpoint
ALTER TABLE "problems" DROP COLUMN "data_blob_id";--> statement-breakpoint
ALTER TABLE "problems" DROP COLUMN "fingerprint";--> statement-breakpoint
ALTER TABLE "problems" DROP COLUMN "source";--> statement-breakpoint
ALTER TABLE "problems" DROP COLUMN "reading";--> statement-breakpoint
ALTER TABLE "problems" DROP COLUMN "structure";