CREATE TABLE "answer_sheets" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"return_id" text NOT NULL,
	"decode" text NOT NULL,
	"solutions" integer NOT NULL,
	"remark" text NOT NULL,
	"token_hash" text NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"revoked_by" text,
	"revoked_at" timestamp with time zone
);
--> statement-breakpoint
ALTER TABLE "returns" ADD COLUMN "summary_blob_id" text;--> statement-breakpoint
ALTER TABLE "answer_sheets" ADD CONSTRAINT "answer_sheets_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "answer_sheets" ADD CONSTRAINT "answer_sheets_return_id_returns_id_fk" FOREIGN KEY ("return_id") REFERENCES "public"."returns"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "answer_sheets" ADD CONSTRAINT "answer_sheets_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "answer_sheets" ADD CONSTRAINT "answer_sheets_revoked_by_users_id_fk" FOREIGN KEY ("revoked_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "answer_sheets_token_hash_index" ON "answer_sheets" USING btree ("token_hash");--> statement-breakpoint
CREATE INDEX "answer_sheets_return_id_index" ON "answer_sheets" USING btree ("return_id");--> statement-breakpoint
ALTER TABLE "returns" ADD CONSTRAINT "returns_summary_blob_id_blobs_id_fk" FOREIGN KEY ("summary_blob_id") REFERENCES "public"."blobs"("id") ON DELETE no action ON UPDATE no action;