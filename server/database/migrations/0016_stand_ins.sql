CREATE TABLE "stand_ins" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"for_user_id" text NOT NULL,
	"by_user_id" text NOT NULL,
	"starts_at" timestamp with time zone NOT NULL,
	"ends_at" timestamp with time zone NOT NULL,
	"made_by" text,
	"created_at" timestamp with time zone NOT NULL,
	"taken_back_at" timestamp with time zone
);
--> statement-breakpoint
ALTER TABLE "run_sheet_remarks" ADD COLUMN "for_user_id" text;--> statement-breakpoint
ALTER TABLE "stand_ins" ADD CONSTRAINT "stand_ins_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stand_ins" ADD CONSTRAINT "stand_ins_for_user_id_users_id_fk" FOREIGN KEY ("for_user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stand_ins" ADD CONSTRAINT "stand_ins_by_user_id_users_id_fk" FOREIGN KEY ("by_user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stand_ins" ADD CONSTRAINT "stand_ins_made_by_users_id_fk" FOREIGN KEY ("made_by") REFERENCES "public"."users"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "stand_ins_workspace_id_ends_at_index" ON "stand_ins" USING btree ("workspace_id","ends_at");--> statement-breakpoint
ALTER TABLE "run_sheet_remarks" ADD CONSTRAINT "run_sheet_remarks_for_user_id_users_id_fk" FOREIGN KEY ("for_user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;