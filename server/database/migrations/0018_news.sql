CREATE TABLE "news" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"user_id" text NOT NULL,
	"kind" text NOT NULL,
	"title" text NOT NULL,
	"text" text NOT NULL,
	"quote" text,
	"path" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"read_at" timestamp with time zone
);
--> statement-breakpoint
ALTER TABLE "news" ADD CONSTRAINT "news_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "news" ADD CONSTRAINT "news_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "news_user_id_workspace_id_created_at_index" ON "news" USING btree ("user_id","workspace_id","created_at");--> statement-breakpoint
CREATE INDEX "news_user_id_workspace_id_index" ON "news" USING btree ("user_id","workspace_id") WHERE read_at is null;--> statement-breakpoint
CREATE INDEX "news_created_at_index" ON "news" USING btree ("created_at");