ALTER TABLE "audit_entries" ADD COLUMN "within" text[] DEFAULT '{}' NOT NULL;--> statement-breakpoint
CREATE INDEX "audit_entries_thing_id_index" ON "audit_entries" USING btree ("thing_id");--> statement-breakpoint
CREATE INDEX "audit_entries_within_index" ON "audit_entries" USING gin ("within");