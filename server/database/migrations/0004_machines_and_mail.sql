CREATE TABLE "broken_embeddings" (
	"machine_id" text NOT NULL,
	"calibration" integer NOT NULL,
	"embedding_id" text NOT NULL,
	"damage" jsonb NOT NULL,
	"holds_again" integer,
	CONSTRAINT "broken_embeddings_machine_id_calibration_embedding_id_pk" PRIMARY KEY("machine_id","calibration","embedding_id")
);
--> statement-breakpoint
CREATE TABLE "capacity_measurements" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"machine_id" text NOT NULL,
	"calibration" integer NOT NULL,
	"status" text NOT NULL,
	"settings" jsonb NOT NULL,
	"result" jsonb,
	"reason" text,
	"seconds" double precision,
	"version" text NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "mails" (
	"id" text PRIMARY KEY NOT NULL,
	"workspace_id" text NOT NULL,
	"to_user_id" text,
	"to_address" text NOT NULL,
	"kind" text NOT NULL,
	"subject" text NOT NULL,
	"text" text NOT NULL,
	"html" text NOT NULL,
	"state" text NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"next_attempt_at" timestamp with time zone,
	"reason" text,
	"created_at" timestamp with time zone NOT NULL,
	"sent_at" timestamp with time zone
);
--> statement-breakpoint
ALTER TABLE "embeddings" ADD COLUMN "replaces" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "machines" ADD COLUMN "graph_blob_id" text;--> statement-breakpoint
ALTER TABLE "returns" ADD COLUMN "embedding_id" text;--> statement-breakpoint
UPDATE "returns" SET "embedding_id" = "run_sheets"."embedding_id" FROM "run_sheets" WHERE "run_sheets"."id" = "returns"."run_sheet_id";--> statement-breakpoint
ALTER TABLE "returns" ALTER COLUMN "embedding_id" SET NOT NULL;--> statement-breakpoint
ALTER TABLE "returns" ADD COLUMN "breaks_blob_id" text;--> statement-breakpoint
ALTER TABLE "broken_embeddings" ADD CONSTRAINT "broken_embeddings_embedding_id_embeddings_id_fk" FOREIGN KEY ("embedding_id") REFERENCES "public"."embeddings"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "broken_embeddings" ADD CONSTRAINT "broken_embeddings_calibration_fk" FOREIGN KEY ("machine_id","calibration") REFERENCES "public"."calibrations"("machine_id","number") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "capacity_measurements" ADD CONSTRAINT "capacity_measurements_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "capacity_measurements" ADD CONSTRAINT "capacity_measurements_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "capacity_measurements" ADD CONSTRAINT "capacity_measurements_calibration_fk" FOREIGN KEY ("machine_id","calibration") REFERENCES "public"."calibrations"("machine_id","number") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mails" ADD CONSTRAINT "mails_workspace_id_workspaces_id_fk" FOREIGN KEY ("workspace_id") REFERENCES "public"."workspaces"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mails" ADD CONSTRAINT "mails_to_user_id_users_id_fk" FOREIGN KEY ("to_user_id") REFERENCES "public"."users"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "broken_embeddings_embedding_id_index" ON "broken_embeddings" USING btree ("embedding_id");--> statement-breakpoint
CREATE INDEX "capacity_measurements_machine_id_calibration_index" ON "capacity_measurements" USING btree ("machine_id","calibration");--> statement-breakpoint
CREATE INDEX "mails_workspace_id_created_at_index" ON "mails" USING btree ("workspace_id","created_at");--> statement-breakpoint
CREATE INDEX "mails_state_next_attempt_at_index" ON "mails" USING btree ("state","next_attempt_at");--> statement-breakpoint
ALTER TABLE "machines" ADD CONSTRAINT "machines_graph_blob_id_blobs_id_fk" FOREIGN KEY ("graph_blob_id") REFERENCES "public"."blobs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "returns" ADD CONSTRAINT "returns_embedding_id_embeddings_id_fk" FOREIGN KEY ("embedding_id") REFERENCES "public"."embeddings"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "returns" ADD CONSTRAINT "returns_breaks_blob_id_blobs_id_fk" FOREIGN KEY ("breaks_blob_id") REFERENCES "public"."blobs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "returns_embedding_id_index" ON "returns" USING btree ("embedding_id");--> statement-breakpoint
INSERT INTO "broken_embeddings" ("machine_id", "calibration", "embedding_id", "damage")
SELECT "calibrations"."machine_id", "calibrations"."number", "embeddings"."id", '{"chains":0,"ofChains":0,"qubitsLost":[],"couplersLost":[]}'
FROM "calibrations", jsonb_array_elements("calibrations"."broke") AS "broken", "embeddings" WHERE "embeddings"."id" = "broken"->>'id';--> statement-breakpoint
UPDATE "calibrations" SET "sheet" = jsonb_set("sheet", '{timing}', "sheet"->'timing' || '{"slopeMaxPerMicrosecond":null,"schedulePointsMax":null}') || '{"energyTable":null,"price":null}';--> statement-breakpoint
ALTER TABLE "calibrations" DROP COLUMN "broke";