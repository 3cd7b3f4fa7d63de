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
CREATE TABLE "clock_offset" (
	"only" boolean PRIMARY KEY DEFAULT true NOT NULL,
	"seconds" bigint DEFAULT 0 NOT NULL,
	CONSTRAINT "clock_offset_one_row" CHECK ("clock_offset"."only")
);
--> statement-breakpoint
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
ALTER TABLE "audit_chain" ADD CONSTRAINT "audit_chain_entry_id_audit_entries_id_fk" FOREIGN KEY ("entry_id") REFERENCES "public"."audit_entries"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_actor_person_id_people_id_fk" FOREIGN KEY ("actor_person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_actor_company_id_companies_id_fk" FOREIGN KEY ("actor_company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mail_events" ADD CONSTRAINT "mail_events_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mail_events" ADD CONSTRAINT "mail_events_to_person_id_people_id_fk" FOREIGN KEY ("to_person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mail_events" ADD CONSTRAINT "mail_events_to_company_id_companies_id_fk" FOREIGN KEY ("to_company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbox_mails" ADD CONSTRAINT "outbox_mails_event_id_mail_events_id_fk" FOREIGN KEY ("event_id") REFERENCES "public"."mail_events"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbox_mails" ADD CONSTRAINT "outbox_mails_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbox_mails" ADD CONSTRAINT "outbox_mails_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "files" ADD CONSTRAINT "files_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "files" ADD CONSTRAINT "files_uploaded_by_people_id_fk" FOREIGN KEY ("uploaded_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
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
CREATE INDEX "audit_entries_company_id_at_idx" ON "audit_entries" USING btree ("company_id","at");--> statement-breakpoint
CREATE INDEX "audit_entries_actor_person_id_idx" ON "audit_entries" USING btree ("actor_person_id");--> statement-breakpoint
CREATE INDEX "audit_entries_actor_company_id_at_idx" ON "audit_entries" USING btree ("actor_company_id","at");--> statement-breakpoint
CREATE INDEX "audit_entries_at_idx" ON "audit_entries" USING btree ("at");--> statement-breakpoint
CREATE INDEX "mail_events_company_id_idx" ON "mail_events" USING btree ("company_id");--> statement-breakpoint
CREATE INDEX "mail_events_to_person_id_idx" ON "mail_events" USING btree ("to_person_id");--> statement-breakpoint
CREATE INDEX "mail_events_to_company_id_idx" ON "mail_events" USING btree ("to_company_id");--> statement-breakpoint
CREATE INDEX "mail_events_waiting_idx" ON "mail_events" USING btree ("created_at") WHERE expanded_at is null;--> statement-breakpoint
CREATE INDEX "outbox_mails_person_id_idx" ON "outbox_mails" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "outbox_mails_company_id_idx" ON "outbox_mails" USING btree ("company_id");--> statement-breakpoint
CREATE INDEX "outbox_mails_waiting_idx" ON "outbox_mails" USING btree ("next_attempt_at") WHERE state = 'waiting';--> statement-breakpoint
CREATE INDEX "files_company_id_idx" ON "files" USING btree ("company_id");--> statement-breakpoint
CREATE INDEX "files_uploaded_by_idx" ON "files" USING btree ("uploaded_by");--> statement-breakpoint
CREATE INDEX "files_sha256_idx" ON "files" USING btree ("sha256");