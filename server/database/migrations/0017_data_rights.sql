CREATE TABLE "archived_people" (
	"user_id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"email" text,
	"roles" text[] NOT NULL
);
--> statement-breakpoint
ALTER TABLE "users" ALTER COLUMN "email" DROP NOT NULL;--> statement-breakpoint
ALTER TABLE "workspaces" ADD COLUMN "deletes_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "archived_people" ADD CONSTRAINT "archived_people_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "archived_people" ADD CONSTRAINT "archived_people_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "archived_people_workspace_id_email_index" ON "archived_people" USING btree ("workspace_id","email");--> statement-breakpoint
CREATE FUNCTION "refuse_change_of_audit_entry"() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
	IF TG_OP = 'DELETE' AND NOT EXISTS (SELECT 1 FROM "workspaces" WHERE "id" = OLD."workspace_id") THEN
		RETURN OLD;
	END IF;
	-- A person who is removed is no longer named; what they did, to what and when stays as it was.
	IF TG_OP = 'UPDATE' AND current_setting('espalier.removing_person', true) = 'on'
		AND to_jsonb(NEW) - 'thing' - 'address' = to_jsonb(OLD) - 'thing' - 'address' THEN
		RETURN NEW;
	END IF;
	RAISE EXCEPTION 'entries of % are only ever added', TG_TABLE_NAME;
END
$$;--> statement-breakpoint
DROP TRIGGER "audit_entries_only_added" ON "audit_entries";--> statement-breakpoint
CREATE TRIGGER "audit_entries_only_added" BEFORE UPDATE OR DELETE ON "audit_entries" FOR EACH ROW EXECUTE FUNCTION "refuse_change_of_audit_entry"();
