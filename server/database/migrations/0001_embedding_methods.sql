ALTER TABLE "embeddings" ADD COLUMN "objective" text DEFAULT 'longest chain' NOT NULL;--> statement-breakpoint
ALTER TABLE "embeddings" ADD COLUMN "target" jsonb DEFAULT '{"longestChain":null,"totalQubits":null}'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "embeddings" ADD COLUMN "start_id" text;--> statement-breakpoint
ALTER TABLE "embeddings" ADD COLUMN "frozen" jsonb DEFAULT '[]'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "embeddings" ADD COLUMN "changed_chains" integer;--> statement-breakpoint
ALTER TABLE "embeddings" ADD COLUMN "method_used" text;--> statement-breakpoint
ALTER TABLE "embeddings" ADD COLUMN "try_number" integer;--> statement-breakpoint
ALTER TABLE "embeddings" ADD COLUMN "first_seconds" double precision;--> statement-breakpoint
ALTER TABLE "embeddings" ADD COLUMN "chosen" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "embeddings" ADD CONSTRAINT "embeddings_start_id_embeddings_id_fk" FOREIGN KEY ("start_id") REFERENCES "public"."embeddings"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "embeddings_problem_id_machine_id_index" ON "embeddings" USING btree ("problem_id","machine_id") WHERE chosen;--> statement-breakpoint
CREATE INDEX "embeddings_start_id_index" ON "embeddings" USING btree ("start_id");--> statement-breakpoint
UPDATE "embeddings" SET "method_used" = "method" WHERE "status" = 'found';--> statement-breakpoint
UPDATE "embeddings" SET "unmet" = "unmet" || '{"proved":false,"neededQubits":null,"advice":[]}'::jsonb WHERE "unmet" IS NOT NULL;
