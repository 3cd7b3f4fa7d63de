CREATE TABLE "specification_comments" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"revision_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"by_id" uuid NOT NULL,
	"place" text NOT NULL,
	"text" text NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"settled_by" uuid,
	"settled_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "specification_comments_settled_together" CHECK (("specification_comments"."settled_at" is null) = ("specification_comments"."settled_by" is null)),
	CONSTRAINT "specification_comments_says_something" CHECK (length(trim("specification_comments"."text")) > 0)
);
--> statement-breakpoint
ALTER TABLE "specification_revisions" ADD COLUMN "figures" jsonb DEFAULT '{}'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "specification_revisions" ADD COLUMN "search_text" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "specification_comments" ADD CONSTRAINT "specification_comments_by_id_people_id_fk" FOREIGN KEY ("by_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "specification_comments" ADD CONSTRAINT "specification_comments_settled_by_people_id_fk" FOREIGN KEY ("settled_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "specification_comments" ADD CONSTRAINT "specification_comments_revision_fk" FOREIGN KEY ("revision_id","company_id") REFERENCES "public"."specification_revisions"("id","company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "specification_comments_revision_idx" ON "specification_comments" USING btree ("revision_id","company_id");--> statement-breakpoint
CREATE INDEX "specification_comments_by_id_idx" ON "specification_comments" USING btree ("by_id");--> statement-breakpoint
CREATE INDEX "specification_comments_settled_by_idx" ON "specification_comments" USING btree ("settled_by");--> statement-breakpoint
CREATE INDEX "specification_revisions_search_idx" ON "specification_revisions" USING gin (to_tsvector('simple', "search_text"));--> statement-breakpoint
CREATE INDEX "specification_revisions_company_updated_idx" ON "specification_revisions" USING btree ("company_id","updated_at");