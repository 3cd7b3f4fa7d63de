CREATE TABLE "part_flags" (
	"company_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"part_id" text NOT NULL,
	"preferred" boolean NOT NULL,
	"stocked" boolean NOT NULL,
	"updated_by" uuid NOT NULL,
	"updated_at" timestamp with time zone NOT NULL,
	CONSTRAINT "part_flags_pkey" PRIMARY KEY("company_id","kind","part_id"),
	CONSTRAINT "part_flags_kind_known" CHECK ("part_flags"."kind" in ('core', 'former', 'material', 'wire', 'tape', 'sleeve'))
);
--> statement-breakpoint
ALTER TABLE "part_flags" ADD CONSTRAINT "part_flags_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_flags" ADD CONSTRAINT "part_flags_updated_by_people_id_fk" FOREIGN KEY ("updated_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "part_flags_updated_by_idx" ON "part_flags" USING btree ("updated_by");