ALTER TABLE "embeddings" ADD COLUMN "deleted_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "embeddings" ADD COLUMN "deleted_with" text;--> statement-breakpoint
ALTER TABLE "problems" ADD COLUMN "deleted_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "problems" ADD COLUMN "deleted_with" text;--> statement-breakpoint
ALTER TABLE "returns" ADD COLUMN "deleted_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "returns" ADD COLUMN "deleted_with" text;--> statement-breakpoint
ALTER TABLE "run_sheets" ADD COLUMN "deleted_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "run_sheets" ADD COLUMN "deleted_with" text;