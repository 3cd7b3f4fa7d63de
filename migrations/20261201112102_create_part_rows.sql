CREATE TABLE "outbox_health" (
	"only" boolean PRIMARY KEY DEFAULT true NOT NULL,
	"waiting" integer DEFAULT 0 NOT NULL,
	"sent" integer DEFAULT 0 NOT NULL,
	"undeliverable" integer DEFAULT 0 NOT NULL,
	"oldest_waiting_since" timestamp with time zone,
	"seen_at" timestamp with time zone,
	CONSTRAINT "outbox_health_one_row" CHECK ("outbox_health"."only")
);
--> statement-breakpoint
CREATE TABLE "part_rows" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid,
	"created_by" uuid,
	"kind" text NOT NULL,
	"part_id" text NOT NULL,
	"version" integer NOT NULL,
	"name" text NOT NULL,
	"sort_key" text NOT NULL,
	"family" text NOT NULL,
	"confidence" text NOT NULL,
	"row" jsonb NOT NULL,
	"reason" text DEFAULT '' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "part_rows_version_key" UNIQUE NULLS NOT DISTINCT("company_id","kind","part_id","version"),
	CONSTRAINT "part_rows_kind_known" CHECK ("part_rows"."kind" in ('core', 'former', 'material', 'wire', 'tape', 'sleeve')),
	CONSTRAINT "part_rows_confidence_known" CHECK ("part_rows"."confidence" in ('high', 'medium', 'low', 'generic')),
	CONSTRAINT "part_rows_version_positive" CHECK ("part_rows"."version" > 0),
	CONSTRAINT "part_rows_row_matches" CHECK ("part_rows"."row" ->> 'kind' = "part_rows"."kind" and "part_rows"."row" ->> 'id' = "part_rows"."part_id" and ("part_rows"."row" ->> 'version')::integer = "part_rows"."version"),
	CONSTRAINT "part_rows_made_by_somebody" CHECK (("part_rows"."company_id" is null) = ("part_rows"."created_by" is null))
);
--> statement-breakpoint
ALTER TABLE "part_rows" ADD CONSTRAINT "part_rows_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_rows" ADD CONSTRAINT "part_rows_created_by_people_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "part_rows_kind_part_id_idx" ON "part_rows" USING btree ("kind","part_id");--> statement-breakpoint
CREATE INDEX "part_rows_created_by_idx" ON "part_rows" USING btree ("created_by");