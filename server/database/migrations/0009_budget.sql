CREATE TABLE "budget_entries" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"number" integer NOT NULL,
	"move" text NOT NULL,
	"machine_id" text,
	"machine_name" text,
	"microseconds" bigint NOT NULL,
	"run_sheet_id" text,
	"about" jsonb,
	"by" text,
	"remark" text NOT NULL,
	"at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
ALTER TABLE "budget_entries" ADD CONSTRAINT "budget_entries_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "budget_entries" ADD CONSTRAINT "budget_entries_by_users_id_fk" FOREIGN KEY ("by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "budget_entries_workspace_id_number_index" ON "budget_entries" USING btree ("workspace_id","number");--> statement-breakpoint
CREATE INDEX "budget_entries_workspace_id_run_sheet_id_index" ON "budget_entries" USING btree ("workspace_id","run_sheet_id");--> statement-breakpoint
CREATE FUNCTION "refuse_change_of_record"() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
	IF TG_OP = 'DELETE' AND NOT EXISTS (SELECT 1 FROM "workspaces" WHERE "id" = OLD."workspace_id") THEN
		RETURN OLD;
	END IF;
	RAISE EXCEPTION 'entries of % are only ever added', TG_TABLE_NAME;
END
$$;--> statement-breakpoint
CREATE TRIGGER "budget_entries_only_added" BEFORE UPDATE OR DELETE ON "budget_entries" FOR EACH ROW EXECUTE FUNCTION "refuse_change_of_record"();
