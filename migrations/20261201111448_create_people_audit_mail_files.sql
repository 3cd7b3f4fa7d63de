CREATE TABLE "audit_chain" (
	"position" bigint PRIMARY KEY NOT NULL,
	"entry_id" uuid NOT NULL,
	"hash" "bytea" NOT NULL,
	"chained_at" timestamp with time zone NOT NULL,
	CONSTRAINT "audit_chain_entry_id_key" UNIQUE("entry_id")
);
--> statement-breakpoint
CREATE TABLE "audit_chain_head" (
	"only" boolean PRIMARY KEY DEFAULT true NOT NULL,
	"position" bigint NOT NULL,
	"hash" "bytea" NOT NULL,
	CONSTRAINT "audit_chain_head_one_row" CHECK ("audit_chain_head"."only")
);
--> statement-breakpoint
CREATE TABLE "audit_entries" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"actor_person_id" uuid,
	"actor_company_id" uuid,
	"sealed_by" uuid,
	"at" timestamp with time zone NOT NULL,
	"area" text NOT NULL,
	"event" jsonb NOT NULL
);
--> statement-breakpoint
CREATE TABLE "clock_offset" (
	"only" boolean PRIMARY KEY DEFAULT true NOT NULL,
	"seconds" bigint DEFAULT 0 NOT NULL,
	CONSTRAINT "clock_offset_one_row" CHECK ("clock_offset"."only")
);
--> statement-breakpoint
CREATE TABLE "files" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"uploaded_by" uuid,
	"sha256" text NOT NULL,
	"size_bytes" bigint NOT NULL,
	"kind" text NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "files_sha256_hex" CHECK ("files"."sha256" ~ '^[0-9a-f]{64}$'),
	CONSTRAINT "files_size_positive" CHECK ("files"."size_bytes" > 0)
);
--> statement-breakpoint
CREATE TABLE "mail_events" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"to_person_id" uuid,
	"to_company_id" uuid,
	"to_roles" text[],
	"to_address" text,
	"template" text NOT NULL,
	"props" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expanded_at" timestamp with time zone,
	CONSTRAINT "mail_events_one_recipient" CHECK (("mail_events"."to_person_id" is null) <> ("mail_events"."to_company_id" is null))
);
--> statement-breakpoint
CREATE TABLE "outbox_mails" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"event_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"template" text NOT NULL,
	"address" text NOT NULL,
	"message_id" text NOT NULL,
	"state" text DEFAULT 'waiting' NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"next_attempt_at" timestamp with time zone NOT NULL,
	"last_error" text DEFAULT '' NOT NULL,
	"sent_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "outbox_mails_event_person_key" UNIQUE("event_id","person_id"),
	CONSTRAINT "outbox_mails_message_id_key" UNIQUE("message_id"),
	CONSTRAINT "outbox_mails_state_known" CHECK ("outbox_mails"."state" in ('waiting', 'sent', 'undeliverable'))
);
--> statement-breakpoint
CREATE TABLE "attempts" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"bucket" text NOT NULL,
	"key_hash" "bytea" NOT NULL,
	"at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "change_requests" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"change" jsonb NOT NULL,
	"state" text DEFAULT 'requested' NOT NULL,
	"requested_by" uuid NOT NULL,
	"requested_at" timestamp with time zone NOT NULL,
	"decided_by" uuid,
	"decided_at" timestamp with time zone,
	CONSTRAINT "change_requests_state_known" CHECK ("change_requests"."state" in ('requested', 'confirmed', 'refused', 'done')),
	CONSTRAINT "change_requests_decided_together" CHECK (("change_requests"."state" = 'requested') = ("change_requests"."decided_by" is null)),
	CONSTRAINT "change_requests_second_person" CHECK ("change_requests"."state" in ('requested', 'refused') or ("change_requests"."decided_by" <> "change_requests"."requested_by" and "change_requests"."decided_by" <> "change_requests"."person_id"))
);
--> statement-breakpoint
CREATE TABLE "companies" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"kind" text NOT NULL,
	"name" text NOT NULL,
	"country" text DEFAULT 'DE' NOT NULL,
	"time_zone" text DEFAULT 'UTC' NOT NULL,
	"currency" text DEFAULT 'EUR' NOT NULL,
	"address" text DEFAULT '' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "companies_id_kind_key" UNIQUE("id","kind"),
	CONSTRAINT "companies_kind_known" CHECK ("companies"."kind" in ('buying', 'vendor', 'operator'))
);
--> statement-breakpoint
CREATE TABLE "credentials" (
	"person_id" uuid PRIMARY KEY NOT NULL,
	"password_hash" text NOT NULL,
	"updated_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "memberships" (
	"person_id" uuid PRIMARY KEY NOT NULL,
	"company_id" uuid NOT NULL,
	"company_kind" text NOT NULL,
	"roles" text[] NOT NULL,
	"approval_limit" numeric(18, 6),
	"approval_currency" text,
	"is_first_contact" boolean DEFAULT false NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "memberships_roles_of_kind" CHECK (cardinality("memberships"."roles") > 0 and case "memberships"."company_kind"
        when 'buying' then "memberships"."roles" <@ array['engineer', 'checker', 'quality', 'buyer', 'approver', 'admin']
        when 'vendor' then "memberships"."roles" <@ array['vendor']
        when 'operator' then "memberships"."roles" <@ array['operator']
        else false end),
	CONSTRAINT "memberships_admin_excludes" CHECK (not ("memberships"."roles" @> array['admin'] and "memberships"."roles" && array['buyer', 'approver', 'vendor'])),
	CONSTRAINT "memberships_approver_has_limit" CHECK (("memberships"."roles" @> array['approver']) = ("memberships"."approval_limit" is not null)),
	CONSTRAINT "memberships_limit_has_currency" CHECK (("memberships"."approval_limit" is null) = ("memberships"."approval_currency" is null)),
	CONSTRAINT "memberships_limit_not_negative" CHECK ("memberships"."approval_limit" >= 0)
);
--> statement-breakpoint
CREATE TABLE "people" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"email" text NOT NULL,
	"invited_by" uuid,
	"accepted_at" timestamp with time zone,
	"left_at" timestamp with time zone,
	"sessions_valid_after" timestamp with time zone DEFAULT now() NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "people_email_lower" CHECK ("people"."email" = lower("people"."email"))
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" text PRIMARY KEY NOT NULL,
	"user_id" uuid NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"started_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "sign_in_tokens" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"person_id" uuid,
	"change_id" uuid,
	"purpose" text NOT NULL,
	"token_hash" "bytea" NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "sign_in_tokens_token_hash_key" UNIQUE("token_hash")
);
--> statement-breakpoint
CREATE TABLE "vendor_links" (
	"buying_company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"invited_at" timestamp with time zone NOT NULL,
	"accepted_at" timestamp with time zone,
	CONSTRAINT "vendor_links_pkey" PRIMARY KEY("buying_company_id","vendor_company_id")
);
--> statement-breakpoint
CREATE TABLE "vendor_relations" (
	"buying_company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"agreement_file_id" uuid,
	"name" text NOT NULL,
	"contact_name" text NOT NULL,
	"contact_email" text NOT NULL,
	"approval" text DEFAULT 'not-assessed' NOT NULL,
	"confidentiality_agreed_on" date,
	"confidentiality_expires_on" date,
	"notes" text DEFAULT '' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "vendor_relations_pkey" PRIMARY KEY("buying_company_id","vendor_company_id"),
	CONSTRAINT "vendor_relations_contact_key" UNIQUE("buying_company_id","contact_email"),
	CONSTRAINT "vendor_relations_approval_known" CHECK ("vendor_relations"."approval" in ('not-assessed', 'approved', 'conditional', 'blocked'))
);
--> statement-breakpoint
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
ALTER TABLE "audit_chain" ADD CONSTRAINT "audit_chain_entry_id_audit_entries_id_fk" FOREIGN KEY ("entry_id") REFERENCES "public"."audit_entries"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_actor_person_id_people_id_fk" FOREIGN KEY ("actor_person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_actor_company_id_companies_id_fk" FOREIGN KEY ("actor_company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "files" ADD CONSTRAINT "files_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "files" ADD CONSTRAINT "files_uploaded_by_people_id_fk" FOREIGN KEY ("uploaded_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mail_events" ADD CONSTRAINT "mail_events_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mail_events" ADD CONSTRAINT "mail_events_to_person_id_people_id_fk" FOREIGN KEY ("to_person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mail_events" ADD CONSTRAINT "mail_events_to_company_id_companies_id_fk" FOREIGN KEY ("to_company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbox_mails" ADD CONSTRAINT "outbox_mails_event_id_mail_events_id_fk" FOREIGN KEY ("event_id") REFERENCES "public"."mail_events"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbox_mails" ADD CONSTRAINT "outbox_mails_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbox_mails" ADD CONSTRAINT "outbox_mails_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "change_requests" ADD CONSTRAINT "change_requests_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "change_requests" ADD CONSTRAINT "change_requests_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "change_requests" ADD CONSTRAINT "change_requests_requested_by_people_id_fk" FOREIGN KEY ("requested_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "change_requests" ADD CONSTRAINT "change_requests_decided_by_people_id_fk" FOREIGN KEY ("decided_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "credentials" ADD CONSTRAINT "credentials_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_company_fk" FOREIGN KEY ("company_id","company_kind") REFERENCES "public"."companies"("id","kind") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "people" ADD CONSTRAINT "people_invited_by_fk" FOREIGN KEY ("invited_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_user_id_people_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sign_in_tokens" ADD CONSTRAINT "sign_in_tokens_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sign_in_tokens" ADD CONSTRAINT "sign_in_tokens_change_id_change_requests_id_fk" FOREIGN KEY ("change_id") REFERENCES "public"."change_requests"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "vendor_links" ADD CONSTRAINT "vendor_links_buying_company_id_companies_id_fk" FOREIGN KEY ("buying_company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "vendor_links" ADD CONSTRAINT "vendor_links_vendor_company_id_companies_id_fk" FOREIGN KEY ("vendor_company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "vendor_relations" ADD CONSTRAINT "vendor_relations_agreement_file_id_files_id_fk" FOREIGN KEY ("agreement_file_id") REFERENCES "public"."files"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "vendor_relations" ADD CONSTRAINT "vendor_relations_link_fk" FOREIGN KEY ("buying_company_id","vendor_company_id") REFERENCES "public"."vendor_links"("buying_company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
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
CREATE INDEX "audit_entries_company_id_at_idx" ON "audit_entries" USING btree ("company_id","at");--> statement-breakpoint
CREATE INDEX "audit_entries_actor_person_id_idx" ON "audit_entries" USING btree ("actor_person_id");--> statement-breakpoint
CREATE INDEX "audit_entries_actor_company_id_at_idx" ON "audit_entries" USING btree ("actor_company_id","at");--> statement-breakpoint
CREATE INDEX "audit_entries_at_idx" ON "audit_entries" USING btree ("at");--> statement-breakpoint
CREATE INDEX "files_company_id_idx" ON "files" USING btree ("company_id");--> statement-breakpoint
CREATE INDEX "files_uploaded_by_idx" ON "files" USING btree ("uploaded_by");--> statement-breakpoint
CREATE INDEX "files_sha256_idx" ON "files" USING btree ("sha256");--> statement-breakpoint
CREATE INDEX "mail_events_company_id_idx" ON "mail_events" USING btree ("company_id");--> statement-breakpoint
CREATE INDEX "mail_events_to_person_id_idx" ON "mail_events" USING btree ("to_person_id");--> statement-breakpoint
CREATE INDEX "mail_events_to_company_id_idx" ON "mail_events" USING btree ("to_company_id");--> statement-breakpoint
CREATE INDEX "mail_events_waiting_idx" ON "mail_events" USING btree ("created_at") WHERE expanded_at is null;--> statement-breakpoint
CREATE INDEX "outbox_mails_person_id_idx" ON "outbox_mails" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "outbox_mails_company_id_idx" ON "outbox_mails" USING btree ("company_id");--> statement-breakpoint
CREATE INDEX "outbox_mails_waiting_idx" ON "outbox_mails" USING btree ("next_attempt_at") WHERE state = 'waiting';--> statement-breakpoint
CREATE INDEX "attempts_bucket_key_at_idx" ON "attempts" USING btree ("bucket","key_hash","at");--> statement-breakpoint
CREATE INDEX "attempts_at_idx" ON "attempts" USING btree ("at");--> statement-breakpoint
CREATE INDEX "change_requests_company_id_idx" ON "change_requests" USING btree ("company_id");--> statement-breakpoint
CREATE INDEX "change_requests_person_id_idx" ON "change_requests" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "change_requests_requested_by_idx" ON "change_requests" USING btree ("requested_by");--> statement-breakpoint
CREATE INDEX "change_requests_decided_by_idx" ON "change_requests" USING btree ("decided_by");--> statement-breakpoint
CREATE UNIQUE INDEX "change_requests_one_open_key" ON "change_requests" USING btree ("person_id",(change ->> 'kind')) WHERE state = 'requested';--> statement-breakpoint
CREATE INDEX "memberships_company_id_idx" ON "memberships" USING btree ("company_id","company_kind");--> statement-breakpoint
CREATE UNIQUE INDEX "memberships_first_contact_key" ON "memberships" USING btree ("company_id") WHERE is_first_contact;--> statement-breakpoint
CREATE UNIQUE INDEX "people_sign_in_address_key" ON "people" USING btree ("email") WHERE accepted_at is not null and left_at is null;--> statement-breakpoint
CREATE INDEX "people_email_idx" ON "people" USING btree ("email");--> statement-breakpoint
CREATE INDEX "people_invited_by_idx" ON "people" USING btree ("invited_by");--> statement-breakpoint
CREATE INDEX "sessions_user_id_idx" ON "sessions" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "sessions_expires_at_idx" ON "sessions" USING btree ("expires_at");--> statement-breakpoint
CREATE INDEX "sign_in_tokens_person_id_idx" ON "sign_in_tokens" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "sign_in_tokens_change_id_idx" ON "sign_in_tokens" USING btree ("change_id");--> statement-breakpoint
CREATE INDEX "vendor_links_vendor_company_id_idx" ON "vendor_links" USING btree ("vendor_company_id");--> statement-breakpoint
CREATE INDEX "vendor_relations_agreement_file_id_idx" ON "vendor_relations" USING btree ("agreement_file_id");--> statement-breakpoint
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