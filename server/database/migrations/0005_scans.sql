CREATE TABLE "scans" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"run_sheet_id" text NOT NULL,
	"embedding_id" text NOT NULL,
	"number" integer NOT NULL,
	"status" text NOT NULL,
	"made" jsonb NOT NULL,
	"settings" jsonb NOT NULL,
	"points" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"reason" text,
	"seconds" double precision,
	"version" text NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"deleted_at" timestamp with time zone,
	"deleted_with" text
);
--> statement-breakpoint
ALTER TABLE "run_sheets" ADD COLUMN "made_from_id" text;--> statement-breakpoint
ALTER TABLE "scans" ADD CONSTRAINT "scans_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "scans" ADD CONSTRAINT "scans_run_sheet_id_run_sheets_id_fk" FOREIGN KEY ("run_sheet_id") REFERENCES "public"."run_sheets"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "scans" ADD CONSTRAINT "scans_embedding_id_embeddings_id_fk" FOREIGN KEY ("embedding_id") REFERENCES "public"."embeddings"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "scans" ADD CONSTRAINT "scans_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "scans_run_sheet_id_number_index" ON "scans" USING btree ("run_sheet_id","number");--> statement-breakpoint
CREATE INDEX "scans_embedding_id_index" ON "scans" USING btree ("embedding_id");--> statement-breakpoint
ALTER TABLE "run_sheets" ADD CONSTRAINT "run_sheets_made_from_id_run_sheets_id_fk" FOREIGN KEY ("made_from_id") REFERENCES "public"."run_sheets"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
UPDATE "run_sheets" SET "settings" = '{"scale":null,"schedule":null}'::jsonb || "settings";--> statement-breakpoint
UPDATE "returns" SET "settings" = '{"scale":null,"schedule":null}'::jsonb || "settings";
