ALTER TABLE "specification_overrides" DROP CONSTRAINT "specification_overrides_code_key";--> statement-breakpoint
ALTER TABLE "specification_overrides" ADD COLUMN "submitted_at" timestamp with time zone NOT NULL DEFAULT now();--> statement-breakpoint
ALTER TABLE "specification_overrides" ALTER COLUMN "submitted_at" DROP DEFAULT;--> statement-breakpoint
ALTER TABLE "specification_overrides" ADD CONSTRAINT "specification_overrides_code_key" UNIQUE("revision_id","code","submitted_at");