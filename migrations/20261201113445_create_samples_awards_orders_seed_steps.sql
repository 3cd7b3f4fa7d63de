CREATE TABLE "award_lines" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"award_id" uuid NOT NULL,
	"rfq_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"line_id" uuid NOT NULL,
	"order_quantity" integer NOT NULL,
	CONSTRAINT "award_lines_quantity_positive" CHECK ("award_lines"."order_quantity" > 0)
);
--> statement-breakpoint
CREATE TABLE "awards" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"rfq_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"comparison_id" uuid NOT NULL,
	"quote_id" uuid NOT NULL,
	"proposed_by" uuid NOT NULL,
	"decided_by" uuid,
	"state" text DEFAULT 'proposed' NOT NULL,
	"total" numeric(18, 6) NOT NULL,
	"currency" text NOT NULL,
	"rates" jsonb NOT NULL,
	"reason" text NOT NULL,
	"decision_reason" text,
	"proposed_at" timestamp with time zone NOT NULL,
	"decided_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "awards_id_parties_key" UNIQUE("id","rfq_id","company_id","vendor_company_id"),
	CONSTRAINT "awards_state_known" CHECK ("awards"."state" in ('proposed', 'approved', 'rejected', 'void', 'ordered')),
	CONSTRAINT "awards_second_person" CHECK ("awards"."state" not in ('approved', 'rejected', 'ordered') or ("awards"."decided_by" is not null and "awards"."decided_by" <> "awards"."proposed_by")),
	CONSTRAINT "awards_decided_together" CHECK (("awards"."decided_at" is null) = ("awards"."decided_by" is null)),
	CONSTRAINT "awards_total_not_negative" CHECK ("awards"."total" >= 0)
);
--> statement-breakpoint
CREATE TABLE "comparisons" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"rfq_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"created_by" uuid NOT NULL,
	"number" integer NOT NULL,
	"content" "bytea" NOT NULL,
	"sha256" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "comparisons_number_key" UNIQUE("rfq_id","number"),
	CONSTRAINT "comparisons_id_rfq_key" UNIQUE("id","rfq_id","company_id")
);
--> statement-breakpoint
CREATE TABLE "order_acknowledgements" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"order_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"answered_by" uuid NOT NULL,
	"answer" text NOT NULL,
	"text" text DEFAULT '' NOT NULL,
	"answered_at" timestamp with time zone NOT NULL,
	CONSTRAINT "order_acknowledgements_order_key" UNIQUE("order_id"),
	CONSTRAINT "order_acknowledgements_known" CHECK ("order_acknowledgements"."answer" in ('accepted', 'accepted-with-changes', 'refused')),
	CONSTRAINT "order_acknowledgements_says_why" CHECK ("order_acknowledgements"."answer" = 'accepted' or length(trim("order_acknowledgements"."text")) > 0)
);
--> statement-breakpoint
CREATE TABLE "purchase_orders" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"award_id" uuid NOT NULL,
	"rfq_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"pdf_file_id" uuid NOT NULL,
	"placed_by" uuid NOT NULL,
	"number" text NOT NULL,
	"acknowledge_by" date NOT NULL,
	"content" "bytea" NOT NULL,
	"sha256" text NOT NULL,
	"pdf_sha256" text NOT NULL,
	"placed_at" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "purchase_orders_award_key" UNIQUE("award_id"),
	CONSTRAINT "purchase_orders_company_number_key" UNIQUE("company_id","number"),
	CONSTRAINT "purchase_orders_id_parties_key" UNIQUE("id","company_id","vendor_company_id")
);
--> statement-breakpoint
CREATE TABLE "sample_dispositions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"set_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"decided_by" uuid NOT NULL,
	"disposition" text NOT NULL,
	"reason" text NOT NULL,
	"concession_quantity" integer,
	"concession_expires_on" date,
	"decided_at" timestamp with time zone NOT NULL,
	CONSTRAINT "sample_dispositions_set_key" UNIQUE("set_id"),
	CONSTRAINT "sample_dispositions_known" CHECK ("sample_dispositions"."disposition" in ('accepted', 'accepted-with-concession', 'change-drawing', 'rework', 'rejected', 'on-hold')),
	CONSTRAINT "sample_dispositions_concession_bounded" CHECK (("sample_dispositions"."disposition" = 'accepted-with-concession') = ("sample_dispositions"."concession_quantity" is not null) and ("sample_dispositions"."concession_quantity" is null) = ("sample_dispositions"."concession_expires_on" is null))
);
--> statement-breakpoint
CREATE TABLE "sample_evidence" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"set_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"file_id" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "sample_evidence_file_key" UNIQUE("set_id","file_id")
);
--> statement-breakpoint
CREATE TABLE "sample_readings" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"set_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"test_row_id" text NOT NULL,
	"symbol" text NOT NULL,
	"serial" text NOT NULL,
	"run" integer NOT NULL,
	"address" text NOT NULL,
	"text" text NOT NULL,
	"kind" text NOT NULL,
	"value" double precision,
	"verdict" text NOT NULL,
	"reason" text NOT NULL,
	CONSTRAINT "sample_readings_cell_key" UNIQUE("set_id","test_row_id","serial","run"),
	CONSTRAINT "sample_readings_verdict_known" CHECK ("sample_readings"."verdict" in ('met', 'not-met', 'not-evidenced')),
	CONSTRAINT "sample_readings_run_positive" CHECK ("sample_readings"."run" > 0)
);
--> statement-breakpoint
CREATE TABLE "sample_requests" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"rfq_id" uuid NOT NULL,
	"invitation_id" uuid NOT NULL,
	"line_id" uuid NOT NULL,
	"release_id" uuid NOT NULL,
	"requested_by" uuid NOT NULL,
	"cancelled_by" uuid,
	"number" text NOT NULL,
	"quantity" integer NOT NULL,
	"sample_kind" text NOT NULL,
	"due_on" date NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"requested_at" timestamp with time zone NOT NULL,
	"cancelled_at" timestamp with time zone,
	"cancelled_reason" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "sample_requests_company_number_key" UNIQUE("company_id","number"),
	CONSTRAINT "sample_requests_id_parties_key" UNIQUE("id","company_id","vendor_company_id"),
	CONSTRAINT "sample_requests_quantity_positive" CHECK ("sample_requests"."quantity" > 0),
	CONSTRAINT "sample_requests_cancelled_together" CHECK (("sample_requests"."cancelled_at" is null) = ("sample_requests"."cancelled_by" is null) and ("sample_requests"."cancelled_at" is null) = ("sample_requests"."cancelled_reason" is null))
);
--> statement-breakpoint
CREATE TABLE "sample_sets" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"request_id" uuid NOT NULL,
	"company_id" uuid NOT NULL,
	"vendor_company_id" uuid NOT NULL,
	"file_id" uuid NOT NULL,
	"uploaded_by" uuid NOT NULL,
	"confirmed_by" uuid,
	"number" integer NOT NULL,
	"kind" text NOT NULL,
	"file_sha256" text NOT NULL,
	"phase" text DEFAULT 'read' NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"answers" jsonb NOT NULL,
	"report" jsonb,
	"verdict" text,
	"record" "bytea",
	"record_sha256" text,
	"uploaded_at" timestamp with time zone NOT NULL,
	"confirmed_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "sample_sets_number_key" UNIQUE("request_id","number"),
	CONSTRAINT "sample_sets_file_key" UNIQUE("request_id","file_sha256"),
	CONSTRAINT "sample_sets_id_parties_key" UNIQUE("id","company_id","vendor_company_id"),
	CONSTRAINT "sample_sets_phase_known" CHECK ("sample_sets"."phase" in ('read', 'judged', 'superseded')),
	CONSTRAINT "sample_sets_kind_known" CHECK ("sample_sets"."kind" in ('readings', 'evidence')),
	CONSTRAINT "sample_sets_verdict_known" CHECK ("sample_sets"."verdict" in ('met', 'not-met', 'not-evidenced')),
	CONSTRAINT "sample_sets_confirmed_together" CHECK (("sample_sets"."confirmed_at" is null) = ("sample_sets"."confirmed_by" is null) and ("sample_sets"."confirmed_at" is null) = ("sample_sets"."record" is null) and ("sample_sets"."confirmed_at" is null) = ("sample_sets"."record_sha256" is null) and ("sample_sets"."confirmed_at" is null) = ("sample_sets"."verdict" is null)),
	CONSTRAINT "sample_sets_judged_is_confirmed" CHECK ("sample_sets"."phase" <> 'judged' or "sample_sets"."confirmed_at" is not null),
	CONSTRAINT "sample_sets_read_is_not" CHECK ("sample_sets"."phase" <> 'read' or "sample_sets"."confirmed_at" is null)
);
--> statement-breakpoint
CREATE TABLE "seed_steps" (
	"name" text PRIMARY KEY NOT NULL,
	"done_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
ALTER TABLE "award_lines" ADD CONSTRAINT "award_lines_award_fk" FOREIGN KEY ("award_id","rfq_id","company_id","vendor_company_id") REFERENCES "public"."awards"("id","rfq_id","company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "award_lines" ADD CONSTRAINT "award_lines_line_fk" FOREIGN KEY ("line_id","rfq_id") REFERENCES "public"."rfq_lines"("id","rfq_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "awards" ADD CONSTRAINT "awards_proposed_by_people_id_fk" FOREIGN KEY ("proposed_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "awards" ADD CONSTRAINT "awards_decided_by_people_id_fk" FOREIGN KEY ("decided_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "awards" ADD CONSTRAINT "awards_comparison_fk" FOREIGN KEY ("comparison_id","rfq_id","company_id") REFERENCES "public"."comparisons"("id","rfq_id","company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "awards" ADD CONSTRAINT "awards_quote_fk" FOREIGN KEY ("quote_id","rfq_id","company_id","vendor_company_id") REFERENCES "public"."quotes"("id","rfq_id","company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "comparisons" ADD CONSTRAINT "comparisons_created_by_people_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "comparisons" ADD CONSTRAINT "comparisons_rfq_fk" FOREIGN KEY ("rfq_id","company_id") REFERENCES "public"."rfqs"("id","company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_acknowledgements" ADD CONSTRAINT "order_acknowledgements_answered_by_people_id_fk" FOREIGN KEY ("answered_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_acknowledgements" ADD CONSTRAINT "order_acknowledgements_order_fk" FOREIGN KEY ("order_id","company_id","vendor_company_id") REFERENCES "public"."purchase_orders"("id","company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "purchase_orders" ADD CONSTRAINT "purchase_orders_pdf_file_id_files_id_fk" FOREIGN KEY ("pdf_file_id") REFERENCES "public"."files"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "purchase_orders" ADD CONSTRAINT "purchase_orders_placed_by_people_id_fk" FOREIGN KEY ("placed_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "purchase_orders" ADD CONSTRAINT "purchase_orders_award_fk" FOREIGN KEY ("award_id","rfq_id","company_id","vendor_company_id") REFERENCES "public"."awards"("id","rfq_id","company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_dispositions" ADD CONSTRAINT "sample_dispositions_decided_by_people_id_fk" FOREIGN KEY ("decided_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_dispositions" ADD CONSTRAINT "sample_dispositions_set_fk" FOREIGN KEY ("set_id","company_id","vendor_company_id") REFERENCES "public"."sample_sets"("id","company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_evidence" ADD CONSTRAINT "sample_evidence_file_id_files_id_fk" FOREIGN KEY ("file_id") REFERENCES "public"."files"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_evidence" ADD CONSTRAINT "sample_evidence_set_fk" FOREIGN KEY ("set_id","company_id","vendor_company_id") REFERENCES "public"."sample_sets"("id","company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_readings" ADD CONSTRAINT "sample_readings_set_fk" FOREIGN KEY ("set_id","company_id","vendor_company_id") REFERENCES "public"."sample_sets"("id","company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_requests" ADD CONSTRAINT "sample_requests_requested_by_people_id_fk" FOREIGN KEY ("requested_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_requests" ADD CONSTRAINT "sample_requests_cancelled_by_people_id_fk" FOREIGN KEY ("cancelled_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_requests" ADD CONSTRAINT "sample_requests_invitation_fk" FOREIGN KEY ("invitation_id","rfq_id","company_id","vendor_company_id") REFERENCES "public"."rfq_invitations"("id","rfq_id","company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_requests" ADD CONSTRAINT "sample_requests_line_fk" FOREIGN KEY ("line_id","rfq_id") REFERENCES "public"."rfq_lines"("id","rfq_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_requests" ADD CONSTRAINT "sample_requests_release_fk" FOREIGN KEY ("release_id","company_id") REFERENCES "public"."specification_releases"("id","company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_sets" ADD CONSTRAINT "sample_sets_file_id_files_id_fk" FOREIGN KEY ("file_id") REFERENCES "public"."files"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_sets" ADD CONSTRAINT "sample_sets_uploaded_by_people_id_fk" FOREIGN KEY ("uploaded_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_sets" ADD CONSTRAINT "sample_sets_confirmed_by_people_id_fk" FOREIGN KEY ("confirmed_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sample_sets" ADD CONSTRAINT "sample_sets_request_fk" FOREIGN KEY ("request_id","company_id","vendor_company_id") REFERENCES "public"."sample_requests"("id","company_id","vendor_company_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "award_lines_line_key" ON "award_lines" USING btree ("award_id","line_id");--> statement-breakpoint
CREATE INDEX "award_lines_award_idx" ON "award_lines" USING btree ("award_id","rfq_id","company_id","vendor_company_id");--> statement-breakpoint
CREATE INDEX "award_lines_line_idx" ON "award_lines" USING btree ("line_id","rfq_id");--> statement-breakpoint
CREATE INDEX "awards_rfq_idx" ON "awards" USING btree ("rfq_id","company_id");--> statement-breakpoint
CREATE INDEX "awards_comparison_idx" ON "awards" USING btree ("comparison_id","rfq_id","company_id");--> statement-breakpoint
CREATE INDEX "awards_quote_idx" ON "awards" USING btree ("quote_id","rfq_id","company_id","vendor_company_id");--> statement-breakpoint
CREATE INDEX "awards_vendor_company_id_idx" ON "awards" USING btree ("vendor_company_id");--> statement-breakpoint
CREATE INDEX "awards_proposed_by_idx" ON "awards" USING btree ("proposed_by");--> statement-breakpoint
CREATE INDEX "awards_decided_by_idx" ON "awards" USING btree ("decided_by");--> statement-breakpoint
CREATE INDEX "comparisons_rfq_idx" ON "comparisons" USING btree ("rfq_id","company_id");--> statement-breakpoint
CREATE INDEX "comparisons_created_by_idx" ON "comparisons" USING btree ("created_by");--> statement-breakpoint
CREATE INDEX "order_acknowledgements_order_idx" ON "order_acknowledgements" USING btree ("order_id","company_id","vendor_company_id");--> statement-breakpoint
CREATE INDEX "order_acknowledgements_answered_by_idx" ON "order_acknowledgements" USING btree ("answered_by");--> statement-breakpoint
CREATE INDEX "purchase_orders_award_idx" ON "purchase_orders" USING btree ("award_id","rfq_id","company_id","vendor_company_id");--> statement-breakpoint
CREATE INDEX "purchase_orders_vendor_company_id_idx" ON "purchase_orders" USING btree ("vendor_company_id");--> statement-breakpoint
CREATE INDEX "purchase_orders_pdf_file_id_idx" ON "purchase_orders" USING btree ("pdf_file_id");--> statement-breakpoint
CREATE INDEX "purchase_orders_placed_by_idx" ON "purchase_orders" USING btree ("placed_by");--> statement-breakpoint
CREATE INDEX "sample_dispositions_set_idx" ON "sample_dispositions" USING btree ("set_id","company_id","vendor_company_id");--> statement-breakpoint
CREATE INDEX "sample_dispositions_decided_by_idx" ON "sample_dispositions" USING btree ("decided_by");--> statement-breakpoint
CREATE INDEX "sample_evidence_set_idx" ON "sample_evidence" USING btree ("set_id","company_id","vendor_company_id");--> statement-breakpoint
CREATE INDEX "sample_evidence_file_id_idx" ON "sample_evidence" USING btree ("file_id");--> statement-breakpoint
CREATE INDEX "sample_readings_set_idx" ON "sample_readings" USING btree ("set_id","company_id","vendor_company_id");--> statement-breakpoint
CREATE INDEX "sample_requests_vendor_company_id_idx" ON "sample_requests" USING btree ("vendor_company_id");--> statement-breakpoint
CREATE INDEX "sample_requests_invitation_idx" ON "sample_requests" USING btree ("invitation_id","rfq_id","company_id","vendor_company_id");--> statement-breakpoint
CREATE INDEX "sample_requests_line_idx" ON "sample_requests" USING btree ("line_id","rfq_id");--> statement-breakpoint
CREATE INDEX "sample_requests_release_idx" ON "sample_requests" USING btree ("release_id","company_id");--> statement-breakpoint
CREATE INDEX "sample_requests_requested_by_idx" ON "sample_requests" USING btree ("requested_by");--> statement-breakpoint
CREATE INDEX "sample_requests_cancelled_by_idx" ON "sample_requests" USING btree ("cancelled_by");--> statement-breakpoint
CREATE UNIQUE INDEX "sample_sets_one_open_key" ON "sample_sets" USING btree ("request_id") WHERE phase = 'read';--> statement-breakpoint
CREATE INDEX "sample_sets_request_idx" ON "sample_sets" USING btree ("request_id","company_id","vendor_company_id");--> statement-breakpoint
CREATE INDEX "sample_sets_vendor_company_id_idx" ON "sample_sets" USING btree ("vendor_company_id");--> statement-breakpoint
CREATE INDEX "sample_sets_file_id_idx" ON "sample_sets" USING btree ("file_id");--> statement-breakpoint
CREATE INDEX "sample_sets_uploaded_by_idx" ON "sample_sets" USING btree ("uploaded_by");--> statement-breakpoint
CREATE INDEX "sample_sets_confirmed_by_idx" ON "sample_sets" USING btree ("confirmed_by");