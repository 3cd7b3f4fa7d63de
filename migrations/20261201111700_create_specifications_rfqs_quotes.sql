CREATE TABLE "quote_drafts" (
	"invitation_id" uuid PRIMARY KEY NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"file_id" uuid,
	"updated_by" uuid NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"content" jsonb NOT NULL,
	"updated_at" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "quote_lines" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"quote_id" uuid NOT NULL,
	"rfq_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"line_id" uuid NOT NULL,
	"price_unit" integer NOT NULL,
	"one_time_cost" numeric(18, 6),
	"one_time_cost_text" text DEFAULT '' NOT NULL,
	"samples_price" numeric(18, 6),
	"sample_lead_time_days" integer,
	"first_order_lead_time_days" integer NOT NULL,
	"repeat_lead_time_days" integer,
	"minimum_order_quantity" integer NOT NULL,
	"pack_quantity" integer,
	"country_of_origin" text,
	CONSTRAINT "quote_lines_line_key" UNIQUE("quote_id","line_id"),
	CONSTRAINT "quote_lines_id_parties_key" UNIQUE("id","rfq_id","company_id","vendor_company_id"),
	CONSTRAINT "quote_lines_price_unit_known" CHECK ("quote_lines"."price_unit" in (1, 100, 1000)),
	CONSTRAINT "quote_lines_one_time_cost_not_negative" CHECK ("quote_lines"."one_time_cost" >= 0),
	CONSTRAINT "quote_lines_samples_price_not_negative" CHECK ("quote_lines"."samples_price" >= 0),
	CONSTRAINT "quote_lines_lead_time_positive" CHECK ("quote_lines"."first_order_lead_time_days" > 0),
	CONSTRAINT "quote_lines_minimum_positive" CHECK ("quote_lines"."minimum_order_quantity" > 0)
);
--> statement-breakpoint
CREATE TABLE "quote_price_breaks" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"quote_line_id" uuid NOT NULL,
	"rfq_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"from_quantity" integer NOT NULL,
	"price" numeric(18, 6) NOT NULL,
	CONSTRAINT "quote_price_breaks_quantity_key" UNIQUE("quote_line_id","from_quantity"),
	CONSTRAINT "quote_price_breaks_quantity_positive" CHECK ("quote_price_breaks"."from_quantity" > 0),
	CONSTRAINT "quote_price_breaks_price_positive" CHECK ("quote_price_breaks"."price" > 0)
);
--> statement-breakpoint
CREATE TABLE "quote_states" (
	"quote_id" uuid PRIMARY KEY NOT NULL,
	"rfq_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"state" text NOT NULL,
	"changed_at" timestamp with time zone NOT NULL,
	CONSTRAINT "quote_states_known" CHECK ("quote_states"."state" in ('submitted', 'superseded', 'withdrawn'))
);
--> statement-breakpoint
CREATE TABLE "quotes" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"invitation_id" uuid NOT NULL,
	"rfq_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"issue_id" uuid NOT NULL,
	"file_id" uuid,
	"submitted_by" uuid NOT NULL,
	"revision" integer NOT NULL,
	"vendor_reference" text NOT NULL,
	"reason" text DEFAULT '' NOT NULL,
	"currency" text NOT NULL,
	"delivery_rule" text NOT NULL,
	"delivery_place" text NOT NULL,
	"payment_terms" text NOT NULL,
	"payment_days" integer,
	"valid_until" date NOT NULL,
	"remarks" text DEFAULT '' NOT NULL,
	"sha256" text NOT NULL,
	"submitted_at" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "quotes_revision_key" UNIQUE("invitation_id","revision"),
	CONSTRAINT "quotes_id_parties_key" UNIQUE("id","rfq_id","company_id","vendor_company_id"),
	CONSTRAINT "quotes_revision_positive" CHECK ("quotes"."revision" > 0)
);
--> statement-breakpoint
CREATE TABLE "rfq_copies" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"invitation_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"line_id" uuid NOT NULL,
	"file_id" uuid NOT NULL,
	"sha256" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "rfq_copies_line_key" UNIQUE("invitation_id","line_id")
);
--> statement-breakpoint
CREATE TABLE "rfq_invitations" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"rfq_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"terms_accepted_by" uuid,
	"state" text DEFAULT 'invited' NOT NULL,
	"no_bid_reason" text,
	"no_bid_text" text DEFAULT '' NOT NULL,
	"issued_at" timestamp with time zone,
	"seen_at" timestamp with time zone,
	"terms_accepted_at" timestamp with time zone,
	"decided_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "rfq_invitations_vendor_key" UNIQUE("rfq_id","vendor_company_id"),
	CONSTRAINT "rfq_invitations_id_vendor_key" UNIQUE("id","rfq_id","company_id","vendor_company_id"),
	CONSTRAINT "rfq_invitations_state_known" CHECK ("rfq_invitations"."state" in ('invited', 'seen', 'terms-accepted', 'intends-to-quote', 'no-bid')),
	CONSTRAINT "rfq_invitations_terms_together" CHECK (("rfq_invitations"."terms_accepted_at" is null) = ("rfq_invitations"."terms_accepted_by" is null))
);
--> statement-breakpoint
CREATE TABLE "rfq_issues" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"rfq_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"issued_by" uuid NOT NULL,
	"number" integer NOT NULL,
	"content" "bytea" NOT NULL,
	"sha256" text NOT NULL,
	"issued_at" timestamp with time zone NOT NULL,
	CONSTRAINT "rfq_issues_number_key" UNIQUE("rfq_id","number")
);
--> statement-breakpoint
CREATE TABLE "rfq_lines" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"rfq_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"release_id" uuid NOT NULL,
	"position" integer NOT NULL,
	"quantities" integer[] NOT NULL,
	"order_quantity" integer NOT NULL,
	"annual_quantity" integer,
	"sample_quantity" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "rfq_lines_position_key" UNIQUE("rfq_id","position"),
	CONSTRAINT "rfq_lines_release_key" UNIQUE("rfq_id","release_id"),
	CONSTRAINT "rfq_lines_id_rfq_key" UNIQUE("id","rfq_id"),
	CONSTRAINT "rfq_lines_quantities_some" CHECK (cardinality("rfq_lines"."quantities") > 0)
);
--> statement-breakpoint
CREATE TABLE "rfqs" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"buyer_id" uuid NOT NULL,
	"opened_by" uuid,
	"opening_asked_by" uuid,
	"number" text NOT NULL,
	"title" text NOT NULL,
	"state" text DEFAULT 'preparing' NOT NULL,
	"issue_number" integer DEFAULT 0 NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"due_at" timestamp with time zone NOT NULL,
	"due_zone" text NOT NULL,
	"currency" text NOT NULL,
	"delivery_rule" text NOT NULL,
	"delivery_place" text NOT NULL,
	"terms" jsonb NOT NULL,
	"issued_at" timestamp with time zone,
	"opening_asked_at" timestamp with time zone,
	"opened_at" timestamp with time zone,
	"cancelled_reason" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "rfqs_company_number_key" UNIQUE("company_id","number"),
	CONSTRAINT "rfqs_id_company_key" UNIQUE("id","company_id"),
	CONSTRAINT "rfqs_state_known" CHECK ("rfqs"."state" in ('preparing', 'issued', 'closed', 'opened', 'awarded', 'cancelled')),
	CONSTRAINT "rfqs_opened_by_two" CHECK ("rfqs"."opened_by" is null or "rfqs"."opened_by" <> "rfqs"."opening_asked_by"),
	CONSTRAINT "rfqs_opened_after_due" CHECK ("rfqs"."opened_at" is null or "rfqs"."opened_at" >= "rfqs"."due_at"),
	CONSTRAINT "rfqs_opened_together" CHECK (("rfqs"."opened_at" is null) = ("rfqs"."opened_by" is null))
);
--> statement-breakpoint
CREATE TABLE "specification_overrides" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"revision_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"by_id" uuid NOT NULL,
	"code" text NOT NULL,
	"reason" text NOT NULL,
	"at" timestamp with time zone NOT NULL,
	CONSTRAINT "specification_overrides_code_key" UNIQUE("revision_id","code")
);
--> statement-breakpoint
CREATE TABLE "specification_releases" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"revision_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"specification_id" uuid NOT NULL,
	"pdf_file_id" uuid NOT NULL,
	"revision" text NOT NULL,
	"part_number" text NOT NULL,
	"title" text NOT NULL,
	"issued_on" date NOT NULL,
	"created_by_name" text NOT NULL,
	"checked_by_name" text NOT NULL,
	"approved_by_name" text NOT NULL,
	"engine" text NOT NULL,
	"specification" "bytea" NOT NULL,
	"specification_sha256" text NOT NULL,
	"pdf_sha256" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "specification_releases_revision_key" UNIQUE("revision_id","company_id"),
	CONSTRAINT "specification_releases_id_company_key" UNIQUE("id","company_id"),
	CONSTRAINT "specification_releases_letter_key" UNIQUE("specification_id","revision")
);
--> statement-breakpoint
CREATE TABLE "specification_revisions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"specification_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"based_on_id" uuid,
	"created_by" uuid NOT NULL,
	"checked_by" uuid,
	"editor_ids" uuid[] NOT NULL,
	"draft_number" integer NOT NULL,
	"state" text DEFAULT 'draft' NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"document" "bytea" NOT NULL,
	"topology" text,
	"evaluation" "bytea",
	"returned_reason" text,
	"withdrawn_reason" text,
	"submitted_at" timestamp with time zone,
	"updated_at" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "specification_revisions_id_company_key" UNIQUE("id","company_id"),
	CONSTRAINT "specification_revisions_draft_number_key" UNIQUE("specification_id","draft_number"),
	CONSTRAINT "specification_revisions_state_known" CHECK ("specification_revisions"."state" in ('draft', 'in-check', 'released', 'superseded', 'withdrawn')),
	CONSTRAINT "specification_revisions_released_by_checker" CHECK ("specification_revisions"."state" not in ('released', 'superseded') or "specification_revisions"."checked_by" is not null),
	CONSTRAINT "specification_revisions_second_person" CHECK ("specification_revisions"."checked_by" is null or not ("specification_revisions"."checked_by" = any ("specification_revisions"."editor_ids")))
);
--> statement-breakpoint
CREATE TABLE "specifications" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"owner_id" uuid NOT NULL,
	"part_number" text NOT NULL,
	"title" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "specifications_company_part_number_key" UNIQUE("company_id","part_number"),
	CONSTRAINT "specifications_id_company_key" UNIQUE("id","company_id")
);
--> statement-breakpoint
ALTER TABLE "quote_drafts" ADD CONSTRAINT "quote_drafts_invitation_id_rfq_invitations_id_fk" FOREIGN KEY ("invitation_id") REFERENCES "public"."rfq_invitations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quote_drafts" ADD CONSTRAINT "quote_drafts_file_id_files_id_fk" FOREIGN KEY ("file_id") REFERENCES "public"."files"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quote_drafts" ADD CONSTRAINT "quote_drafts_updated_by_people_id_fk" FOREIGN KEY ("updated_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quote_lines" ADD CONSTRAINT "quote_lines_quote_fk" FOREIGN KEY ("quote_id","rfq_id","company_id","vendor_company_id") REFERENCES "public"."quotes"("id","rfq_id","company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quote_lines" ADD CONSTRAINT "quote_lines_line_fk" FOREIGN KEY ("line_id","rfq_id") REFERENCES "public"."rfq_lines"("id","rfq_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quote_price_breaks" ADD CONSTRAINT "quote_price_breaks_line_fk" FOREIGN KEY ("quote_line_id","rfq_id","company_id","vendor_company_id") REFERENCES "public"."quote_lines"("id","rfq_id","company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quote_states" ADD CONSTRAINT "quote_states_quote_fk" FOREIGN KEY ("quote_id","rfq_id","company_id","vendor_company_id") REFERENCES "public"."quotes"("id","rfq_id","company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quotes" ADD CONSTRAINT "quotes_issue_id_rfq_issues_id_fk" FOREIGN KEY ("issue_id") REFERENCES "public"."rfq_issues"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quotes" ADD CONSTRAINT "quotes_file_id_files_id_fk" FOREIGN KEY ("file_id") REFERENCES "public"."files"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quotes" ADD CONSTRAINT "quotes_submitted_by_people_id_fk" FOREIGN KEY ("submitted_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quotes" ADD CONSTRAINT "quotes_invitation_fk" FOREIGN KEY ("invitation_id","rfq_id","company_id","vendor_company_id") REFERENCES "public"."rfq_invitations"("id","rfq_id","company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfq_copies" ADD CONSTRAINT "rfq_copies_invitation_id_rfq_invitations_id_fk" FOREIGN KEY ("invitation_id") REFERENCES "public"."rfq_invitations"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfq_copies" ADD CONSTRAINT "rfq_copies_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfq_copies" ADD CONSTRAINT "rfq_copies_vendor_company_id_companies_id_fk" FOREIGN KEY ("vendor_company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfq_copies" ADD CONSTRAINT "rfq_copies_line_id_rfq_lines_id_fk" FOREIGN KEY ("line_id") REFERENCES "public"."rfq_lines"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfq_copies" ADD CONSTRAINT "rfq_copies_file_id_files_id_fk" FOREIGN KEY ("file_id") REFERENCES "public"."files"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfq_invitations" ADD CONSTRAINT "rfq_invitations_vendor_company_id_companies_id_fk" FOREIGN KEY ("vendor_company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfq_invitations" ADD CONSTRAINT "rfq_invitations_terms_accepted_by_people_id_fk" FOREIGN KEY ("terms_accepted_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfq_invitations" ADD CONSTRAINT "rfq_invitations_rfq_fk" FOREIGN KEY ("rfq_id","company_id") REFERENCES "public"."rfqs"("id","company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfq_issues" ADD CONSTRAINT "rfq_issues_issued_by_people_id_fk" FOREIGN KEY ("issued_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfq_issues" ADD CONSTRAINT "rfq_issues_rfq_fk" FOREIGN KEY ("rfq_id","company_id") REFERENCES "public"."rfqs"("id","company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfq_lines" ADD CONSTRAINT "rfq_lines_rfq_fk" FOREIGN KEY ("rfq_id","company_id") REFERENCES "public"."rfqs"("id","company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfq_lines" ADD CONSTRAINT "rfq_lines_release_fk" FOREIGN KEY ("release_id","company_id") REFERENCES "public"."specification_releases"("id","company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfqs" ADD CONSTRAINT "rfqs_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfqs" ADD CONSTRAINT "rfqs_buyer_id_people_id_fk" FOREIGN KEY ("buyer_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfqs" ADD CONSTRAINT "rfqs_opened_by_people_id_fk" FOREIGN KEY ("opened_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rfqs" ADD CONSTRAINT "rfqs_opening_asked_by_people_id_fk" FOREIGN KEY ("opening_asked_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "specification_overrides" ADD CONSTRAINT "specification_overrides_by_id_people_id_fk" FOREIGN KEY ("by_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "specification_overrides" ADD CONSTRAINT "specification_overrides_revision_fk" FOREIGN KEY ("revision_id","company_id") REFERENCES "public"."specification_revisions"("id","company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "specification_releases" ADD CONSTRAINT "specification_releases_pdf_file_id_files_id_fk" FOREIGN KEY ("pdf_file_id") REFERENCES "public"."files"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "specification_releases" ADD CONSTRAINT "specification_releases_revision_fk" FOREIGN KEY ("revision_id","company_id") REFERENCES "public"."specification_revisions"("id","company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "specification_releases" ADD CONSTRAINT "specification_releases_specification_fk" FOREIGN KEY ("specification_id","company_id") REFERENCES "public"."specifications"("id","company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "specification_revisions" ADD CONSTRAINT "specification_revisions_created_by_people_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "specification_revisions" ADD CONSTRAINT "specification_revisions_checked_by_people_id_fk" FOREIGN KEY ("checked_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "specification_revisions" ADD CONSTRAINT "specification_revisions_specification_fk" FOREIGN KEY ("specification_id","company_id") REFERENCES "public"."specifications"("id","company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "specifications" ADD CONSTRAINT "specifications_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "specifications" ADD CONSTRAINT "specifications_owner_id_people_id_fk" FOREIGN KEY ("owner_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "quote_drafts_vendor_company_id_idx" ON "quote_drafts" USING btree ("vendor_company_id");--> statement-breakpoint
CREATE INDEX "quote_drafts_file_id_idx" ON "quote_drafts" USING btree ("file_id");--> statement-breakpoint
CREATE INDEX "quote_drafts_updated_by_idx" ON "quote_drafts" USING btree ("updated_by");--> statement-breakpoint
CREATE INDEX "quote_lines_quote_idx" ON "quote_lines" USING btree ("quote_id","rfq_id","company_id","vendor_company_id");--> statement-breakpoint
CREATE INDEX "quote_lines_line_idx" ON "quote_lines" USING btree ("line_id","rfq_id");--> statement-breakpoint
CREATE INDEX "quote_price_breaks_line_idx" ON "quote_price_breaks" USING btree ("quote_line_id","rfq_id","company_id","vendor_company_id");--> statement-breakpoint
CREATE INDEX "quote_states_quote_idx" ON "quote_states" USING btree ("quote_id","rfq_id","company_id","vendor_company_id");--> statement-breakpoint
CREATE INDEX "quotes_invitation_idx" ON "quotes" USING btree ("invitation_id","rfq_id","company_id","vendor_company_id");--> statement-breakpoint
CREATE INDEX "quotes_rfq_id_idx" ON "quotes" USING btree ("rfq_id");--> statement-breakpoint
CREATE INDEX "quotes_vendor_company_id_idx" ON "quotes" USING btree ("vendor_company_id");--> statement-breakpoint
CREATE INDEX "quotes_issue_id_idx" ON "quotes" USING btree ("issue_id");--> statement-breakpoint
CREATE INDEX "quotes_file_id_idx" ON "quotes" USING btree ("file_id");--> statement-breakpoint
CREATE INDEX "quotes_submitted_by_idx" ON "quotes" USING btree ("submitted_by");--> statement-breakpoint
CREATE INDEX "rfq_copies_company_id_idx" ON "rfq_copies" USING btree ("company_id");--> statement-breakpoint
CREATE INDEX "rfq_copies_vendor_company_id_idx" ON "rfq_copies" USING btree ("vendor_company_id");--> statement-breakpoint
CREATE INDEX "rfq_copies_line_id_idx" ON "rfq_copies" USING btree ("line_id");--> statement-breakpoint
CREATE INDEX "rfq_copies_file_id_idx" ON "rfq_copies" USING btree ("file_id");--> statement-breakpoint
CREATE INDEX "rfq_invitations_rfq_idx" ON "rfq_invitations" USING btree ("rfq_id","company_id");--> statement-breakpoint
CREATE INDEX "rfq_invitations_vendor_company_id_idx" ON "rfq_invitations" USING btree ("vendor_company_id");--> statement-breakpoint
CREATE INDEX "rfq_invitations_terms_accepted_by_idx" ON "rfq_invitations" USING btree ("terms_accepted_by");--> statement-breakpoint
CREATE INDEX "rfq_issues_rfq_idx" ON "rfq_issues" USING btree ("rfq_id","company_id");--> statement-breakpoint
CREATE INDEX "rfq_issues_issued_by_idx" ON "rfq_issues" USING btree ("issued_by");--> statement-breakpoint
CREATE INDEX "rfq_lines_rfq_idx" ON "rfq_lines" USING btree ("rfq_id","company_id");--> statement-breakpoint
CREATE INDEX "rfq_lines_release_idx" ON "rfq_lines" USING btree ("release_id","company_id");--> statement-breakpoint
CREATE INDEX "rfqs_buyer_id_idx" ON "rfqs" USING btree ("buyer_id");--> statement-breakpoint
CREATE INDEX "rfqs_opened_by_idx" ON "rfqs" USING btree ("opened_by");--> statement-breakpoint
CREATE INDEX "rfqs_opening_asked_by_idx" ON "rfqs" USING btree ("opening_asked_by");--> statement-breakpoint
CREATE INDEX "rfqs_due_at_idx" ON "rfqs" USING btree ("due_at");--> statement-breakpoint
CREATE INDEX "specification_overrides_revision_idx" ON "specification_overrides" USING btree ("revision_id","company_id");--> statement-breakpoint
CREATE INDEX "specification_overrides_by_id_idx" ON "specification_overrides" USING btree ("by_id");--> statement-breakpoint
CREATE INDEX "specification_releases_specification_id_idx" ON "specification_releases" USING btree ("specification_id","company_id");--> statement-breakpoint
CREATE INDEX "specification_releases_pdf_file_id_idx" ON "specification_releases" USING btree ("pdf_file_id");--> statement-breakpoint
CREATE UNIQUE INDEX "specification_revisions_one_open_key" ON "specification_revisions" USING btree ("specification_id") WHERE state in ('draft', 'in-check');--> statement-breakpoint
CREATE INDEX "specification_revisions_specification_id_idx" ON "specification_revisions" USING btree ("specification_id","company_id");--> statement-breakpoint
CREATE INDEX "specification_revisions_based_on_id_idx" ON "specification_revisions" USING btree ("based_on_id");--> statement-breakpoint
CREATE INDEX "specification_revisions_created_by_idx" ON "specification_revisions" USING btree ("created_by");--> statement-breakpoint
CREATE INDEX "specification_revisions_checked_by_idx" ON "specification_revisions" USING btree ("checked_by");--> statement-breakpoint
CREATE INDEX "specifications_owner_id_idx" ON "specifications" USING btree ("owner_id");