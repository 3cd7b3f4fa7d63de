-- Calendar date in a company's zone, by the one clock.
CREATE FUNCTION company_today(company uuid) RETURNS date LANGUAGE sql VOLATILE
  AS $$ SELECT (app_now() AT TIME ZONE c.time_zone)::date FROM companies c WHERE c.id = company $$;--> statement-breakpoint

-- Samples. A request is asked of a vendor of an opened enquiry and names exactly the release of its line.
SELECT protect_table('sample_requests');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (cancelled_at, cancelled_by, cancelled_reason) ON sample_requests TO dotside_app;--> statement-breakpoint
CREATE POLICY sample_requests_read ON sample_requests FOR SELECT TO dotside_app USING (
  (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()))
  OR (vendor_company_id = (SELECT app_company_id()) AND (SELECT app_is_vendor()))
);--> statement-breakpoint
CREATE POLICY sample_requests_create ON sample_requests FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND requested_by = app_person_id() AND cancelled_at IS NULL
  AND app_is_buying() AND app_has_role('buyer', 'engineer', 'quality') AND rfq_is_opened(rfq_id)
  AND EXISTS (SELECT FROM rfq_lines l WHERE l.id = line_id AND l.rfq_id = sample_requests.rfq_id AND l.release_id = sample_requests.release_id)
  AND EXISTS (SELECT FROM rfq_invitations i WHERE i.id = invitation_id AND i.terms_accepted_at IS NOT NULL)
);--> statement-breakpoint
CREATE POLICY sample_requests_cancel ON sample_requests FOR UPDATE TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND app_is_buying() AND app_has_role('buyer', 'engineer', 'quality'))
  WITH CHECK (cancelled_by = app_person_id());--> statement-breakpoint
SELECT freeze_rows('sample_requests', 'OLD.cancelled_at IS NOT NULL');--> statement-breakpoint

-- A report is the vendor's alone until the vendor confirms it; then it never changes.
SELECT protect_table('sample_sets');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (phase, version, answers, report, verdict, record, record_sha256, confirmed_at, confirmed_by) ON sample_sets TO dotside_app;--> statement-breakpoint
CREATE POLICY sample_sets_read ON sample_sets FOR SELECT TO dotside_app USING (
  (company_id = (SELECT app_company_id()) AND confirmed_at IS NOT NULL AND (SELECT app_reads_engineering()))
  OR (vendor_company_id = (SELECT app_company_id()) AND (SELECT app_is_vendor()))
);--> statement-breakpoint
CREATE POLICY sample_sets_create ON sample_sets FOR INSERT TO dotside_app WITH CHECK (
  vendor_company_id = app_company_id() AND uploaded_by = app_person_id() AND app_is_vendor() AND phase = 'read' AND confirmed_at IS NULL
  AND EXISTS (SELECT FROM sample_requests r WHERE r.id = request_id AND r.cancelled_at IS NULL)
  AND EXISTS (SELECT FROM files f WHERE f.id = file_id AND f.company_id = app_company_id() AND f.sha256 = file_sha256)
);--> statement-breakpoint
CREATE POLICY sample_sets_update ON sample_sets FOR UPDATE TO dotside_app
  USING (vendor_company_id = (SELECT app_company_id()) AND app_is_vendor())
  WITH CHECK (vendor_company_id = app_company_id());--> statement-breakpoint
SELECT freeze_rows('sample_sets', 'OLD.confirmed_at IS NOT NULL', 'phase');--> statement-breakpoint
CREATE FUNCTION guard_sample_set() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF NEW.phase <> OLD.phase AND (OLD.phase, NEW.phase) NOT IN (('read', 'judged'), ('read', 'superseded'), ('judged', 'superseded')) THEN
    RAISE EXCEPTION 'a report does not go from % to %', OLD.phase, NEW.phase USING ERRCODE = 'DS001';
  END IF;
  IF OLD.phase = 'judged' AND NEW.phase = 'superseded' AND EXISTS (SELECT FROM sample_dispositions d WHERE d.set_id = OLD.id) THEN
    RAISE EXCEPTION 'a report with its disposition stays as it is' USING ERRCODE = 'DS001';
  END IF;
  IF NEW.confirmed_by IS DISTINCT FROM OLD.confirmed_by AND NEW.confirmed_by IS DISTINCT FROM app_person_id() THEN
    RAISE EXCEPTION 'a report is confirmed by the person who acts' USING ERRCODE = 'DS001';
  END IF;
  IF NEW.confirmed_at IS NOT NULL AND OLD.confirmed_at IS NULL AND (NEW.phase <> 'judged' OR NEW.report IS NULL) THEN
    RAISE EXCEPTION 'a report is confirmed with its declaration and judged' USING ERRCODE = 'DS001';
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER guarded BEFORE UPDATE ON sample_sets FOR EACH ROW EXECUTE FUNCTION guard_sample_set();--> statement-breakpoint

SELECT protect_table('sample_evidence'), make_append_only('sample_evidence');--> statement-breakpoint
GRANT SELECT, INSERT ON sample_evidence TO dotside_app;--> statement-breakpoint
CREATE POLICY sample_evidence_read ON sample_evidence FOR SELECT TO dotside_app
  USING (EXISTS (SELECT FROM sample_sets s WHERE s.id = sample_evidence.set_id));--> statement-breakpoint
CREATE POLICY sample_evidence_create ON sample_evidence FOR INSERT TO dotside_app WITH CHECK (
  vendor_company_id = app_company_id() AND app_is_vendor()
  AND EXISTS (SELECT FROM sample_sets s WHERE s.id = set_id AND s.phase = 'read' AND s.vendor_company_id = app_company_id())
  AND EXISTS (SELECT FROM files f WHERE f.id = file_id AND f.company_id = app_company_id())
);--> statement-breakpoint

-- Readings are written while the report is being confirmed, and never after.
SELECT protect_table('sample_readings'), make_append_only('sample_readings');--> statement-breakpoint
GRANT SELECT, INSERT ON sample_readings TO dotside_app;--> statement-breakpoint
CREATE POLICY sample_readings_read ON sample_readings FOR SELECT TO dotside_app
  USING (EXISTS (SELECT FROM sample_sets s WHERE s.id = sample_readings.set_id));--> statement-breakpoint
CREATE POLICY sample_readings_create ON sample_readings FOR INSERT TO dotside_app WITH CHECK (
  vendor_company_id = app_company_id() AND app_is_vendor()
  AND EXISTS (SELECT FROM sample_sets s WHERE s.id = set_id AND s.phase = 'read' AND s.vendor_company_id = app_company_id())
);--> statement-breakpoint

SELECT protect_table('sample_dispositions'), make_append_only('sample_dispositions');--> statement-breakpoint
GRANT SELECT, INSERT ON sample_dispositions TO dotside_app;--> statement-breakpoint
CREATE POLICY sample_dispositions_read ON sample_dispositions FOR SELECT TO dotside_app
  USING (EXISTS (SELECT FROM sample_sets s WHERE s.id = sample_dispositions.set_id));--> statement-breakpoint
-- Missing evidence is no pass, and what fails is never plainly accepted.
CREATE POLICY sample_dispositions_create ON sample_dispositions FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND decided_by = app_person_id() AND app_is_buying() AND app_has_role('quality', 'engineer')
  AND EXISTS (
    SELECT FROM sample_sets s WHERE s.id = set_id AND s.phase = 'judged'
      AND (s.verdict = 'met' OR disposition <> 'accepted')
      AND (s.verdict <> 'not-evidenced' OR disposition IN ('rework', 'rejected', 'on-hold'))
  )
);--> statement-breakpoint
CREATE POLICY files_read_sample ON files FOR SELECT TO dotside_app USING (
  (SELECT app_reads_engineering()) AND (
    EXISTS (SELECT FROM sample_sets s WHERE s.file_id = files.id AND s.company_id = (SELECT app_company_id()))
    OR EXISTS (SELECT FROM sample_evidence e WHERE e.file_id = files.id AND e.company_id = (SELECT app_company_id()))
  )
);--> statement-breakpoint

-- Comparisons hold prices: purchasing reads them, everybody who works with drawings once it is decided. No vendor ever.
SELECT protect_table('comparisons'), make_append_only('comparisons');--> statement-breakpoint
GRANT SELECT, INSERT ON comparisons TO dotside_app;--> statement-breakpoint
SELECT protect_table('awards');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (state, decided_by, decided_at, decision_reason) ON awards TO dotside_app;--> statement-breakpoint
CREATE POLICY awards_read ON awards FOR SELECT TO dotside_app USING (
  company_id = (SELECT app_company_id()) AND (
    (SELECT app_is_buying() AND app_has_role('buyer', 'approver'))
    OR (state IN ('approved', 'ordered') AND (SELECT app_reads_engineering()))
  )
);--> statement-breakpoint
CREATE POLICY comparisons_read ON comparisons FOR SELECT TO dotside_app USING (
  company_id = (SELECT app_company_id()) AND (
    (SELECT app_is_buying() AND app_has_role('buyer', 'approver'))
    OR ((SELECT app_reads_engineering()) AND EXISTS (SELECT FROM awards a WHERE a.comparison_id = comparisons.id AND a.state IN ('approved', 'ordered')))
  )
);--> statement-breakpoint
CREATE POLICY comparisons_create ON comparisons FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND created_by = app_person_id() AND app_is_buying() AND app_has_role('buyer') AND rfq_is_opened(rfq_id)
);--> statement-breakpoint
-- The quotation in force, still valid today, on the newest comparison.
CREATE POLICY awards_propose ON awards FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND proposed_by = app_person_id() AND state = 'proposed' AND decided_by IS NULL
  AND app_is_buying() AND app_has_role('buyer') AND rfq_is_opened(rfq_id)
  AND EXISTS (SELECT FROM quotes q WHERE q.id = quote_id AND q.valid_until >= company_today(awards.company_id))
  AND EXISTS (SELECT FROM quote_states s WHERE s.quote_id = awards.quote_id AND s.state = 'submitted')
  AND EXISTS (SELECT FROM comparisons c WHERE c.id = comparison_id AND c.created_by = app_person_id())
);--> statement-breakpoint
CREATE POLICY awards_decide ON awards FOR UPDATE TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND app_is_buying() AND app_has_role('buyer', 'approver'));--> statement-breakpoint
-- Whether the acting person's limit covers an amount; one unit of another currency is worth `rates ->> code`.
CREATE FUNCTION approval_limit_covers(amount numeric, base text, rates jsonb) RETURNS boolean LANGUAGE sql STABLE AS $$
  SELECT EXISTS (
    SELECT FROM memberships m
    WHERE m.person_id = app_person_id() AND m.approval_limit IS NOT NULL
      AND amount <= m.approval_limit * CASE WHEN m.approval_currency = base THEN 1 ELSE (rates ->> m.approval_currency)::numeric END
  )
$$;--> statement-breakpoint
CREATE FUNCTION guard_award() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF (OLD.state, NEW.state) NOT IN (('proposed', 'approved'), ('proposed', 'rejected'), ('proposed', 'void'), ('approved', 'void'), ('approved', 'ordered')) THEN
    RAISE EXCEPTION 'an award does not go from % to %', OLD.state, NEW.state USING ERRCODE = 'DS001';
  END IF;
  IF NEW.state IN ('approved', 'rejected') AND (NEW.decided_by IS DISTINCT FROM app_person_id() OR NEW.decided_by = OLD.proposed_by OR NOT app_has_role('approver')) THEN
    RAISE EXCEPTION 'an award is decided by an approver who did not propose it' USING ERRCODE = 'DS001';
  END IF;
  IF NEW.state IN ('void', 'ordered') AND ((NEW.decided_by, NEW.decided_at, NEW.decision_reason) IS DISTINCT FROM (OLD.decided_by, OLD.decided_at, OLD.decision_reason) OR NOT app_has_role('buyer')) THEN
    RAISE EXCEPTION 'a buyer orders or proposes anew, and leaves the decision as it is' USING ERRCODE = 'DS001';
  END IF;
  IF NEW.state = 'approved' AND NOT approval_limit_covers(OLD.total, OLD.currency, OLD.rates) THEN
    RAISE EXCEPTION 'the approval limit does not cover the award' USING ERRCODE = 'DS001';
  END IF;
  IF NEW.state IN ('approved', 'ordered') AND NOT EXISTS (SELECT FROM quotes q WHERE q.id = OLD.quote_id AND q.valid_until >= company_today(OLD.company_id)) THEN
    RAISE EXCEPTION 'the quotation has expired' USING ERRCODE = 'DS001';
  END IF;
  IF NEW.state = 'ordered' AND NOT EXISTS (SELECT FROM purchase_orders p WHERE p.award_id = OLD.id) THEN
    RAISE EXCEPTION 'an award is ordered by its purchase order' USING ERRCODE = 'DS001';
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER guarded BEFORE UPDATE ON awards FOR EACH ROW EXECUTE FUNCTION guard_award();--> statement-breakpoint
CREATE TRIGGER kept BEFORE DELETE ON awards FOR EACH ROW EXECUTE FUNCTION refuse_change();--> statement-breakpoint
CREATE TRIGGER kept_whole BEFORE TRUNCATE ON awards FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();--> statement-breakpoint

SELECT protect_table('award_lines'), make_append_only('award_lines');--> statement-breakpoint
GRANT SELECT, INSERT ON award_lines TO dotside_app;--> statement-breakpoint
CREATE POLICY award_lines_read ON award_lines FOR SELECT TO dotside_app
  USING (EXISTS (SELECT FROM awards a WHERE a.id = award_lines.award_id));--> statement-breakpoint
CREATE POLICY award_lines_propose ON award_lines FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND app_is_buying() AND app_has_role('buyer')
  AND EXISTS (SELECT FROM awards a WHERE a.id = award_id AND a.state = 'proposed' AND a.proposed_by = app_person_id())
  AND EXISTS (SELECT FROM awards a JOIN quote_lines q ON q.quote_id = a.quote_id WHERE a.id = award_id AND q.line_id = award_lines.line_id)
);--> statement-breakpoint

-- Orders: the company's own, and the vendor's own. What was placed and what was answered stand still.
SELECT protect_table('purchase_orders'), make_append_only('purchase_orders');--> statement-breakpoint
GRANT SELECT, INSERT ON purchase_orders TO dotside_app;--> statement-breakpoint
CREATE POLICY purchase_orders_read ON purchase_orders FOR SELECT TO dotside_app USING (
  (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()))
  OR (vendor_company_id = (SELECT app_company_id()) AND (SELECT app_is_vendor()))
);--> statement-breakpoint
CREATE POLICY purchase_orders_place ON purchase_orders FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND placed_by = app_person_id() AND app_is_buying() AND app_has_role('buyer')
  AND EXISTS (SELECT FROM awards a WHERE a.id = award_id AND a.state = 'approved')
  AND EXISTS (SELECT FROM files f WHERE f.id = pdf_file_id AND f.company_id = app_company_id() AND f.sha256 = pdf_sha256)
);--> statement-breakpoint
CREATE POLICY files_read_order ON files FOR SELECT TO dotside_app USING (
  (SELECT app_is_vendor()) AND EXISTS (SELECT FROM purchase_orders p WHERE p.pdf_file_id = files.id AND p.vendor_company_id = (SELECT app_company_id()))
);--> statement-breakpoint
SELECT protect_table('order_acknowledgements'), make_append_only('order_acknowledgements');--> statement-breakpoint
GRANT SELECT, INSERT ON order_acknowledgements TO dotside_app;--> statement-breakpoint
CREATE POLICY order_acknowledgements_read ON order_acknowledgements FOR SELECT TO dotside_app
  USING (EXISTS (SELECT FROM purchase_orders p WHERE p.id = order_acknowledgements.order_id));--> statement-breakpoint
CREATE POLICY order_acknowledgements_answer ON order_acknowledgements FOR INSERT TO dotside_app WITH CHECK (
  vendor_company_id = app_company_id() AND answered_by = app_person_id() AND app_is_vendor()
  AND EXISTS (SELECT FROM purchase_orders p WHERE p.id = order_id AND p.vendor_company_id = app_company_id())
);
