CREATE TABLE "bridge_calls" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"run_sheet_id" text NOT NULL,
	"kind" text NOT NULL,
	"state" text NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"earlier_attempts" integer DEFAULT 0 NOT NULL,
	"next_attempt_at" timestamp with time zone,
	"tries" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"token_hashes" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"token_expires_at" timestamp with time zone,
	"returned_digest" text,
	"return_id" text,
	"refusal" text,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
ALTER TABLE "bridge_calls" ADD CONSTRAINT "bridge_calls_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "bridge_calls" ADD CONSTRAINT "bridge_calls_run_sheet_id_run_sheets_id_fk" FOREIGN KEY ("run_sheet_id") REFERENCES "public"."run_sheets"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "bridge_calls" ADD CONSTRAINT "bridge_calls_return_id_returns_id_fk" FOREIGN KEY ("return_id") REFERENCES "public"."returns"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "bridge_calls" ADD CONSTRAINT "bridge_calls_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "bridge_calls_run_sheet_id_index" ON "bridge_calls" USING btree ("run_sheet_id");--> statement-breakpoint
CREATE INDEX "bridge_calls_state_next_attempt_at_index" ON "bridge_calls" USING btree ("state","next_attempt_at");