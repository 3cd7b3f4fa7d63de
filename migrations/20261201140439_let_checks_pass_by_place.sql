ALTER TABLE "specification_overrides" DROP CONSTRAINT "specification_overrides_code_key";--> statement-breakpoint
ALTER TABLE "specification_overrides" ADD COLUMN "path" text NOT NULL DEFAULT '';--> statement-breakpoint
ALTER TABLE "specification_overrides" ALTER COLUMN "path" DROP DEFAULT;--> statement-breakpoint
ALTER TABLE "specification_overrides" ADD CONSTRAINT "specification_overrides_code_key" UNIQUE("revision_id","code","path","submitted_at");