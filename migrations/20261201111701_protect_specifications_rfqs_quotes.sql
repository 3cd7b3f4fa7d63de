-- Specifications: the buying company's own. Who only manages accounts reads none of it.
CREATE FUNCTION app_reads_engineering() RETURNS boolean LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT app_is_buying() AND app_has_role('engineer', 'checker', 'quality', 'buyer', 'approver') $$;--> statement-breakpoint

SELECT protect_table('specifications');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (part_number, title) ON specifications TO dotside_app;--> statement-breakpoint
GRANT SELECT ON specifications TO dotside_worker;--> statement-breakpoint
CREATE POLICY specifications_worker ON specifications FOR SELECT TO dotside_worker USING (true);--> statement-breakpoint
CREATE POLICY specifications_read ON specifications FOR SELECT TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()));--> statement-breakpoint
CREATE POLICY specifications_create ON specifications FOR INSERT TO dotside_app
  WITH CHECK (company_id = app_company_id() AND owner_id = app_person_id() AND app_is_buying() AND app_has_role('engineer'));--> statement-breakpoint
CREATE POLICY specifications_update ON specifications FOR UPDATE TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND app_is_buying() AND app_has_role('engineer'));--> statement-breakpoint

SELECT protect_table('specification_revisions');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE ON specification_revisions TO dotside_app;--> statement-breakpoint
CREATE POLICY specification_revisions_read ON specification_revisions FOR SELECT TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()));--> statement-breakpoint
CREATE POLICY specification_revisions_create ON specification_revisions FOR INSERT TO dotside_app
  WITH CHECK (
    company_id = app_company_id() AND created_by = app_person_id() AND editor_ids = ARRAY[app_person_id()] AND state = 'draft'
    AND app_is_buying() AND app_has_role('engineer')
  );--> statement-breakpoint
CREATE POLICY specification_revisions_update ON specification_revisions FOR UPDATE TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND app_is_buying() AND app_has_role('engineer', 'checker'));--> statement-breakpoint
-- After release only the state moves on; what was released never changes.
SELECT freeze_rows('specification_revisions', 'OLD.state NOT IN (''draft'', ''in-check'')', 'state', 'withdrawn_reason', 'updated_at');--> statement-breakpoint

-- Whoever stores a change of a document is written down as its editor, and only a checker who is none releases.
CREATE FUNCTION guard_specification_revision() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF NOT NEW.editor_ids @> OLD.editor_ids THEN
    RAISE EXCEPTION 'an editor of a revision stays its editor' USING ERRCODE = 'DS001';
  END IF;
  IF NEW.document IS DISTINCT FROM OLD.document AND NOT (app_person_id() = ANY (NEW.editor_ids)) THEN
    RAISE EXCEPTION 'the editor of a revision must be written down' USING ERRCODE = 'DS001';
  END IF;
  IF NEW.document IS DISTINCT FROM OLD.document AND OLD.state <> 'draft' THEN
    RAISE EXCEPTION 'only a draft can be changed' USING ERRCODE = 'DS001';
  END IF;
  IF NEW.state = 'released' AND OLD.state <> 'released' AND (OLD.state <> 'in-check' OR NEW.checked_by IS DISTINCT FROM app_person_id() OR NOT app_has_role('checker')) THEN
    RAISE EXCEPTION 'a revision is released from check by its checker' USING ERRCODE = 'DS001';
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER guarded BEFORE UPDATE ON specification_revisions FOR EACH ROW EXECUTE FUNCTION guard_specification_revision();--> statement-breakpoint

SELECT protect_table('specification_overrides'), make_append_only('specification_overrides');--> statement-breakpoint
GRANT SELECT, INSERT ON specification_overrides TO dotside_app;--> statement-breakpoint
CREATE POLICY specification_overrides_read ON specification_overrides FOR SELECT TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()));--> statement-breakpoint
CREATE POLICY specification_overrides_create ON specification_overrides FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND by_id = app_person_id() AND app_is_buying() AND app_has_role('checker', 'quality')
  AND EXISTS (SELECT FROM specification_revisions r WHERE r.id = revision_id AND r.state = 'in-check' AND NOT (app_person_id() = ANY (r.editor_ids)))
);--> statement-breakpoint

-- Enquiries. A vendor sees its own invitation once it is issued, and through it the enquiry, never another invitation.
SELECT protect_table('rfq_invitations');--> statement-breakpoint
GRANT SELECT, INSERT, DELETE, UPDATE (state, no_bid_reason, no_bid_text, issued_at, seen_at, terms_accepted_at, terms_accepted_by, decided_at) ON rfq_invitations TO dotside_app;--> statement-breakpoint
GRANT SELECT ON rfq_invitations TO dotside_worker;--> statement-breakpoint
CREATE POLICY rfq_invitations_worker ON rfq_invitations FOR SELECT TO dotside_worker USING (true);--> statement-breakpoint
CREATE POLICY rfq_invitations_read ON rfq_invitations FOR SELECT TO dotside_app USING (
  (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()))
  OR (vendor_company_id = (SELECT app_company_id()) AND (SELECT app_is_vendor()) AND issued_at IS NOT NULL)
);--> statement-breakpoint
CREATE POLICY rfq_invitations_create ON rfq_invitations FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND app_is_buying() AND app_has_role('buyer')
  AND state = 'invited' AND seen_at IS NULL AND terms_accepted_at IS NULL
  AND EXISTS (SELECT FROM vendor_links l WHERE l.buying_company_id = app_company_id() AND l.vendor_company_id = rfq_invitations.vendor_company_id)
);--> statement-breakpoint
CREATE POLICY rfq_invitations_remove ON rfq_invitations FOR DELETE TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND app_is_buying() AND app_has_role('buyer') AND issued_at IS NULL);--> statement-breakpoint
CREATE POLICY rfq_invitations_issue ON rfq_invitations FOR UPDATE TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND app_is_buying() AND app_has_role('buyer') AND issued_at IS NULL)
  WITH CHECK (company_id = app_company_id());--> statement-breakpoint
CREATE POLICY rfq_invitations_answer ON rfq_invitations FOR UPDATE TO dotside_app
  USING (vendor_company_id = (SELECT app_company_id()) AND app_is_vendor() AND issued_at IS NOT NULL)
  WITH CHECK (vendor_company_id = app_company_id());--> statement-breakpoint
-- What a vendor accepted or saw is not taken back, and each side moves only its own columns.
CREATE FUNCTION guard_rfq_invitation() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF OLD.terms_accepted_at IS NOT NULL AND (NEW.terms_accepted_at, NEW.terms_accepted_by) IS DISTINCT FROM (OLD.terms_accepted_at, OLD.terms_accepted_by) THEN
    RAISE EXCEPTION 'accepted terms stay accepted' USING ERRCODE = 'DS001';
  END IF;
  IF NEW.terms_accepted_by IS DISTINCT FROM OLD.terms_accepted_by AND NEW.terms_accepted_by IS DISTINCT FROM app_person_id() THEN
    RAISE EXCEPTION 'terms are accepted by the person who acts' USING ERRCODE = 'DS001';
  END IF;
  IF app_is_buying() AND (NEW.state, NEW.seen_at, NEW.terms_accepted_at, NEW.no_bid_reason, NEW.no_bid_text) IS DISTINCT FROM (OLD.state, OLD.seen_at, OLD.terms_accepted_at, OLD.no_bid_reason, OLD.no_bid_text) THEN
    RAISE EXCEPTION 'the answer to an invitation is the vendor''s' USING ERRCODE = 'DS001';
  END IF;
  IF app_is_vendor() AND NEW.issued_at IS DISTINCT FROM OLD.issued_at THEN
    RAISE EXCEPTION 'an invitation is issued by the buyer' USING ERRCODE = 'DS001';
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER guarded BEFORE UPDATE ON rfq_invitations FOR EACH ROW EXECUTE FUNCTION guard_rfq_invitation();--> statement-breakpoint

SELECT protect_table('rfqs');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE ON rfqs TO dotside_app;--> statement-breakpoint
GRANT SELECT, UPDATE (state) ON rfqs TO dotside_worker;--> statement-breakpoint
CREATE POLICY rfqs_worker ON rfqs TO dotside_worker USING (true);--> statement-breakpoint
CREATE POLICY rfqs_read ON rfqs FOR SELECT TO dotside_app USING (
  (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()))
  OR ((SELECT app_is_vendor()) AND issued_at IS NOT NULL AND EXISTS (SELECT FROM rfq_invitations i WHERE i.rfq_id = rfqs.id AND i.vendor_company_id = (SELECT app_company_id())))
);--> statement-breakpoint
CREATE POLICY rfqs_create ON rfqs FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND buyer_id = app_person_id() AND state = 'preparing' AND issued_at IS NULL AND opened_at IS NULL AND opening_asked_at IS NULL
  AND app_is_buying() AND app_has_role('buyer')
);--> statement-breakpoint
CREATE POLICY rfqs_update ON rfqs FOR UPDATE TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()));--> statement-breakpoint
-- The seal: quotations open after the due time, asked for by a buyer and done by another person with another role.
CREATE FUNCTION guard_rfq() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  content text[] := ARRAY['id', 'company_id', 'number', 'title', 'due_zone', 'currency', 'delivery_rule', 'delivery_place', 'terms', 'issued_at', 'created_at'];
BEGIN
  IF OLD.state <> 'preparing' AND (SELECT jsonb_object_agg(k, to_jsonb(OLD) -> k) IS DISTINCT FROM jsonb_object_agg(k, to_jsonb(NEW) -> k) FROM unnest(content) k) THEN
    RAISE EXCEPTION 'an issued enquiry is immutable' USING ERRCODE = 'DS001';
  END IF;
  IF OLD.state <> 'preparing' AND NEW.state = 'preparing' THEN
    RAISE EXCEPTION 'an issued enquiry stays issued' USING ERRCODE = 'DS001';
  END IF;
  IF OLD.state <> 'preparing' AND NEW.due_at IS DISTINCT FROM OLD.due_at
    AND (OLD.state <> 'issued' OR app_now() >= OLD.due_at OR NEW.due_at < OLD.due_at OR NOT app_has_role('buyer')) THEN
    RAISE EXCEPTION 'a due time moves only later, and only before it has passed' USING ERRCODE = 'DS001';
  END IF;
  IF (NEW.opening_asked_at, NEW.opening_asked_by) IS DISTINCT FROM (OLD.opening_asked_at, OLD.opening_asked_by)
    AND (OLD.opened_at IS NOT NULL OR NEW.opening_asked_by IS DISTINCT FROM app_person_id() OR NOT app_has_role('buyer') OR app_now() < NEW.due_at OR OLD.state NOT IN ('issued', 'closed')) THEN
    RAISE EXCEPTION 'the opening is asked for by a buyer after the due time' USING ERRCODE = 'DS001';
  END IF;
  IF (NEW.opened_at, NEW.opened_by) IS DISTINCT FROM (OLD.opened_at, OLD.opened_by)
    AND (OLD.opened_at IS NOT NULL OR OLD.state NOT IN ('issued', 'closed') OR OLD.opening_asked_by IS NULL OR NEW.opened_by IS DISTINCT FROM app_person_id() OR NEW.opened_by = OLD.opening_asked_by
      OR NOT app_has_role('approver', 'quality', 'engineer') OR app_now() < OLD.due_at OR NEW.due_at <> OLD.due_at) THEN
    RAISE EXCEPTION 'the opening is done after the due time by a second person with a second role' USING ERRCODE = 'DS001';
  END IF;
  IF NEW.state IN ('opened', 'awarded') AND NEW.opened_at IS NULL THEN
    RAISE EXCEPTION 'an enquiry is opened before it is awarded' USING ERRCODE = 'DS001';
  END IF;
  IF NOT app_has_role('buyer') AND (to_jsonb(NEW) - ARRAY['state', 'opened_at', 'opened_by', 'version']) IS DISTINCT FROM (to_jsonb(OLD) - ARRAY['state', 'opened_at', 'opened_by', 'version']) THEN
    RAISE EXCEPTION 'only a buyer changes an enquiry' USING ERRCODE = 'DS001';
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER guarded BEFORE UPDATE ON rfqs FOR EACH ROW EXECUTE FUNCTION guard_rfq();--> statement-breakpoint

SELECT protect_table('rfq_lines');--> statement-breakpoint
GRANT SELECT, INSERT, DELETE, UPDATE (release_id, position, quantities, order_quantity, annual_quantity, sample_quantity) ON rfq_lines TO dotside_app;--> statement-breakpoint
CREATE POLICY rfq_lines_read ON rfq_lines FOR SELECT TO dotside_app USING (
  (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()))
  OR ((SELECT app_is_vendor()) AND EXISTS (
    SELECT FROM rfq_invitations i WHERE i.rfq_id = rfq_lines.rfq_id AND i.vendor_company_id = (SELECT app_company_id()) AND i.terms_accepted_at IS NOT NULL
  ))
);--> statement-breakpoint
CREATE POLICY rfq_lines_write ON rfq_lines TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND app_is_buying() AND app_has_role('buyer'))
  WITH CHECK (company_id = app_company_id() AND app_is_buying() AND app_has_role('buyer'));--> statement-breakpoint
CREATE FUNCTION guard_rfq_line() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  enquiry uuid := CASE WHEN TG_OP = 'DELETE' THEN OLD.rfq_id ELSE NEW.rfq_id END;
BEGIN
  IF EXISTS (SELECT FROM rfqs r WHERE r.id = enquiry AND r.state <> 'preparing') THEN
    RAISE EXCEPTION 'the lines of an issued enquiry are immutable' USING ERRCODE = 'DS001';
  END IF;
  RETURN CASE WHEN TG_OP = 'DELETE' THEN OLD ELSE NEW END;
END $$;--> statement-breakpoint
CREATE TRIGGER guarded BEFORE INSERT OR UPDATE OR DELETE ON rfq_lines FOR EACH ROW EXECUTE FUNCTION guard_rfq_line();--> statement-breakpoint

SELECT protect_table('rfq_issues'), make_append_only('rfq_issues');--> statement-breakpoint
GRANT SELECT, INSERT ON rfq_issues TO dotside_app;--> statement-breakpoint
CREATE POLICY rfq_issues_read ON rfq_issues FOR SELECT TO dotside_app USING (
  (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()))
  OR ((SELECT app_is_vendor()) AND EXISTS (
    SELECT FROM rfq_invitations i WHERE i.rfq_id = rfq_issues.rfq_id AND i.vendor_company_id = (SELECT app_company_id()) AND i.terms_accepted_at IS NOT NULL
  ))
);--> statement-breakpoint
CREATE POLICY rfq_issues_create ON rfq_issues FOR INSERT TO dotside_app
  WITH CHECK (company_id = app_company_id() AND issued_by = app_person_id() AND app_is_buying() AND app_has_role('buyer'));--> statement-breakpoint

-- Releases: the company's, and those of an enquiry for a vendor that accepted its confidentiality.
SELECT protect_table('specification_releases'), make_append_only('specification_releases');--> statement-breakpoint
GRANT SELECT, INSERT ON specification_releases TO dotside_app;--> statement-breakpoint
CREATE POLICY specification_releases_read ON specification_releases FOR SELECT TO dotside_app USING (
  (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()))
  OR ((SELECT app_is_vendor()) AND EXISTS (
    SELECT FROM rfq_lines l JOIN rfq_invitations i ON i.rfq_id = l.rfq_id
    WHERE l.release_id = specification_releases.id AND i.vendor_company_id = (SELECT app_company_id()) AND i.terms_accepted_at IS NOT NULL
  ))
);--> statement-breakpoint
CREATE POLICY specification_releases_create ON specification_releases FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND app_is_buying() AND app_has_role('checker')
  AND EXISTS (SELECT FROM specification_revisions r WHERE r.id = revision_id AND r.state = 'released' AND r.checked_by = app_person_id())
);--> statement-breakpoint
CREATE POLICY files_read_release ON files FOR SELECT TO dotside_app USING (
  (SELECT app_is_vendor()) AND EXISTS (SELECT FROM specification_releases s WHERE s.pdf_file_id = files.id)
);--> statement-breakpoint

SELECT protect_table('rfq_copies'), make_append_only('rfq_copies');--> statement-breakpoint
GRANT SELECT, INSERT ON rfq_copies TO dotside_app;--> statement-breakpoint
CREATE POLICY rfq_copies_read ON rfq_copies FOR SELECT TO dotside_app USING (
  (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()))
  OR (vendor_company_id = (SELECT app_company_id()) AND (SELECT app_is_vendor()))
);--> statement-breakpoint
CREATE POLICY rfq_copies_create ON rfq_copies FOR INSERT TO dotside_app WITH CHECK (
  vendor_company_id = app_company_id() AND app_is_vendor()
  AND EXISTS (
    SELECT FROM rfq_invitations i JOIN rfq_lines l ON l.rfq_id = i.rfq_id
    WHERE i.id = invitation_id AND l.id = line_id AND i.company_id = rfq_copies.company_id AND i.terms_accepted_at IS NOT NULL
  )
);--> statement-breakpoint

-- Quotations. Drafts are the vendor's alone; what is submitted is sealed until the opening.
SELECT protect_table('quote_drafts');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE, DELETE ON quote_drafts TO dotside_app;--> statement-breakpoint
CREATE POLICY quote_drafts_own ON quote_drafts TO dotside_app
  USING (vendor_company_id = (SELECT app_company_id()) AND (SELECT app_is_vendor()))
  WITH CHECK (
    vendor_company_id = app_company_id() AND app_is_vendor() AND updated_by = app_person_id()
    AND EXISTS (SELECT FROM rfq_invitations i WHERE i.id = invitation_id AND i.vendor_company_id = app_company_id() AND i.terms_accepted_at IS NOT NULL)
    AND (file_id IS NULL OR EXISTS (SELECT FROM files f WHERE f.id = file_id AND f.company_id = app_company_id()))
  );--> statement-breakpoint

CREATE FUNCTION rfq_is_opened(enquiry uuid) RETURNS boolean LANGUAGE sql STABLE
  AS $$ SELECT EXISTS (SELECT FROM rfqs r WHERE r.id = enquiry AND r.opened_at IS NOT NULL) $$;--> statement-breakpoint
CREATE FUNCTION rfq_takes_quotes(enquiry uuid) RETURNS boolean LANGUAGE sql VOLATILE
  AS $$ SELECT EXISTS (SELECT FROM rfqs r WHERE r.id = enquiry AND r.state = 'issued' AND app_now() < r.due_at) $$;--> statement-breakpoint

SELECT protect_table('quotes'), make_append_only('quotes');--> statement-breakpoint
GRANT SELECT, INSERT ON quotes TO dotside_app;--> statement-breakpoint
CREATE POLICY quotes_own ON quotes FOR SELECT TO dotside_app
  USING (vendor_company_id = (SELECT app_company_id()) AND (SELECT app_is_vendor()));--> statement-breakpoint
CREATE POLICY quotes_opened ON quotes FOR SELECT TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND (SELECT app_is_buying() AND app_has_role('buyer', 'approver')) AND rfq_is_opened(rfq_id));--> statement-breakpoint
CREATE POLICY quotes_submit ON quotes FOR INSERT TO dotside_app WITH CHECK (
  vendor_company_id = app_company_id() AND submitted_by = app_person_id() AND app_is_vendor() AND rfq_takes_quotes(rfq_id)
  AND EXISTS (SELECT FROM rfq_invitations i WHERE i.id = invitation_id AND i.terms_accepted_at IS NOT NULL)
  AND (file_id IS NULL OR EXISTS (SELECT FROM files f WHERE f.id = file_id AND f.company_id = app_company_id()))
);--> statement-breakpoint
CREATE POLICY files_read_quote ON files FOR SELECT TO dotside_app USING (
  (SELECT app_is_buying() AND app_has_role('buyer', 'approver')) AND EXISTS (SELECT FROM quotes q WHERE q.file_id = files.id AND q.company_id = (SELECT app_company_id()))
);--> statement-breakpoint

SELECT protect_table('quote_states');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (state, changed_at) ON quote_states TO dotside_app;--> statement-breakpoint
CREATE POLICY quote_states_own ON quote_states FOR SELECT TO dotside_app
  USING (vendor_company_id = (SELECT app_company_id()) AND (SELECT app_is_vendor()));--> statement-breakpoint
CREATE POLICY quote_states_opened ON quote_states FOR SELECT TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND (SELECT app_is_buying() AND app_has_role('buyer', 'approver')) AND rfq_is_opened(rfq_id));--> statement-breakpoint
CREATE POLICY quote_states_create ON quote_states FOR INSERT TO dotside_app
  WITH CHECK (vendor_company_id = app_company_id() AND app_is_vendor() AND state = 'submitted' AND rfq_takes_quotes(rfq_id));--> statement-breakpoint
CREATE POLICY quote_states_change ON quote_states FOR UPDATE TO dotside_app
  USING (vendor_company_id = (SELECT app_company_id()) AND app_is_vendor() AND state = 'submitted' AND rfq_takes_quotes(rfq_id))
  WITH CHECK (vendor_company_id = app_company_id() AND state IN ('superseded', 'withdrawn'));--> statement-breakpoint

SELECT protect_table('quote_lines'), make_append_only('quote_lines');--> statement-breakpoint
GRANT SELECT, INSERT ON quote_lines TO dotside_app;--> statement-breakpoint
CREATE POLICY quote_lines_own ON quote_lines FOR SELECT TO dotside_app
  USING (vendor_company_id = (SELECT app_company_id()) AND (SELECT app_is_vendor()));--> statement-breakpoint
CREATE POLICY quote_lines_opened ON quote_lines FOR SELECT TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND (SELECT app_is_buying() AND app_has_role('buyer', 'approver')) AND rfq_is_opened(rfq_id));--> statement-breakpoint
CREATE POLICY quote_lines_submit ON quote_lines FOR INSERT TO dotside_app
  WITH CHECK (vendor_company_id = app_company_id() AND app_is_vendor() AND rfq_takes_quotes(rfq_id));--> statement-breakpoint

SELECT protect_table('quote_price_breaks'), make_append_only('quote_price_breaks');--> statement-breakpoint
GRANT SELECT, INSERT ON quote_price_breaks TO dotside_app;--> statement-breakpoint
CREATE POLICY quote_price_breaks_own ON quote_price_breaks FOR SELECT TO dotside_app
  USING (vendor_company_id = (SELECT app_company_id()) AND (SELECT app_is_vendor()));--> statement-breakpoint
CREATE POLICY quote_price_breaks_opened ON quote_price_breaks FOR SELECT TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND (SELECT app_is_buying() AND app_has_role('buyer', 'approver')) AND rfq_is_opened(rfq_id));--> statement-breakpoint
CREATE POLICY quote_price_breaks_submit ON quote_price_breaks FOR INSERT TO dotside_app
  WITH CHECK (vendor_company_id = app_company_id() AND app_is_vendor() AND rfq_takes_quotes(rfq_id));
