-- Who has quoted is sealed with what was quoted: before the opening no row that the buying side reads tells it.
-- After the opening everybody who works on the enquiry reads who quoted; prices stay with purchasing.
ALTER POLICY quote_states_opened ON quote_states
  USING (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()) AND rfq_is_opened(rfq_id));--> statement-breakpoint
-- The worker reminds nobody who has quoted, and reads no other table of quotations.
GRANT SELECT ON quote_states TO dotside_worker;--> statement-breakpoint
CREATE POLICY quote_states_worker ON quote_states FOR SELECT TO dotside_worker USING (true);--> statement-breakpoint

UPDATE rfq_invitations SET state = 'terms-accepted' WHERE state = 'intends-to-quote';--> statement-breakpoint

-- An enquiry goes its way in one direction, closes when it is due, and is awarded by an order.
CREATE FUNCTION guard_rfq_state() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF NEW.state = OLD.state THEN
    RETURN NEW;
  END IF;
  IF (OLD.state, NEW.state) NOT IN (
    ('preparing', 'issued'), ('preparing', 'cancelled'), ('issued', 'closed'), ('issued', 'opened'), ('issued', 'cancelled'),
    ('closed', 'opened'), ('closed', 'cancelled'), ('opened', 'awarded'), ('opened', 'cancelled')
  ) THEN
    RAISE EXCEPTION 'an enquiry does not go from % to %', OLD.state, NEW.state USING ERRCODE = 'DS001';
  END IF;
  IF NEW.state = 'closed' AND app_now() < NEW.due_at THEN
    RAISE EXCEPTION 'an enquiry closes at its due time' USING ERRCODE = 'DS001';
  END IF;
  IF NEW.state = 'awarded' THEN
    IF NOT EXISTS (SELECT FROM awards a WHERE a.rfq_id = NEW.id AND a.state = 'ordered') THEN
      RAISE EXCEPTION 'an enquiry is awarded by an order' USING ERRCODE = 'DS001';
    END IF;
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER guarded_state BEFORE UPDATE OF state ON rfqs FOR EACH ROW EXECUTE FUNCTION guard_rfq_state();--> statement-breakpoint

-- Vendors are invited while an enquiry is prepared and told when it is issued; nobody is let in later.
CREATE FUNCTION guard_invitation_time() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF TG_OP = 'INSERT' AND NEW.issued_at IS NOT NULL THEN
    RAISE EXCEPTION 'an invitation is issued with its enquiry' USING ERRCODE = 'DS001';
  END IF;
  IF (TG_OP = 'INSERT' OR NEW.issued_at IS DISTINCT FROM OLD.issued_at) AND NOT EXISTS (SELECT FROM rfqs r WHERE r.id = NEW.rfq_id AND r.state = 'preparing') THEN
    RAISE EXCEPTION 'vendors are invited while an enquiry is prepared' USING ERRCODE = 'DS001';
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER guarded_time BEFORE INSERT OR UPDATE ON rfq_invitations FOR EACH ROW EXECUTE FUNCTION guard_invitation_time();--> statement-breakpoint

-- An issue is the one that its enquiry counts, and a quotation answers the newest issue of its own enquiry.
CREATE FUNCTION guard_rfq_issue() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF NOT EXISTS (SELECT FROM rfqs r WHERE r.id = NEW.rfq_id AND r.state = 'issued' AND r.issue_number = NEW.number) THEN
    RAISE EXCEPTION 'an issue is the one that its enquiry counts' USING ERRCODE = 'DS001';
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER guarded BEFORE INSERT ON rfq_issues FOR EACH ROW EXECUTE FUNCTION guard_rfq_issue();--> statement-breakpoint
CREATE FUNCTION guard_quote_issue() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF NOT EXISTS (SELECT FROM rfq_issues i JOIN rfqs r ON r.id = i.rfq_id WHERE i.id = NEW.issue_id AND i.rfq_id = NEW.rfq_id AND i.number = r.issue_number) THEN
    RAISE EXCEPTION 'a quotation answers the newest issue of its enquiry' USING ERRCODE = 'DS001';
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER guarded_issue AFTER INSERT ON quotes FOR EACH ROW EXECUTE FUNCTION guard_quote_issue();--> statement-breakpoint

-- Parts of a sealed whole are written with it: no line or price is added to what was submitted or proposed before.
CREATE FUNCTION guard_written_together() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  part jsonb := to_jsonb(NEW);
  together boolean;
BEGIN
  CASE TG_TABLE_NAME
    WHEN 'quote_lines' THEN
      together := EXISTS (SELECT FROM quotes q WHERE q.id = (part ->> 'quote_id')::uuid AND q.created_at = now());
    WHEN 'quote_price_breaks' THEN
      together := EXISTS (SELECT FROM quote_lines l JOIN quotes q ON q.id = l.quote_id WHERE l.id = (part ->> 'quote_line_id')::uuid AND q.created_at = now());
    WHEN 'award_lines' THEN
      together := EXISTS (SELECT FROM awards a WHERE a.id = (part ->> 'award_id')::uuid AND a.created_at = now());
  END CASE;
  IF NOT together THEN
    RAISE EXCEPTION 'a row of % is written together with its whole', TG_TABLE_NAME USING ERRCODE = 'DS001';
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER written_together BEFORE INSERT ON quote_lines FOR EACH ROW EXECUTE FUNCTION guard_written_together();--> statement-breakpoint
CREATE TRIGGER written_together BEFORE INSERT ON quote_price_breaks FOR EACH ROW EXECUTE FUNCTION guard_written_together();--> statement-breakpoint
CREATE TRIGGER written_together BEFORE INSERT ON award_lines FOR EACH ROW EXECUTE FUNCTION guard_written_together();--> statement-breakpoint

-- Nothing is approved or ordered of an enquiry that was cancelled or not opened.
CREATE FUNCTION guard_open_enquiry() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF NOT EXISTS (SELECT FROM rfqs r WHERE r.id = NEW.rfq_id AND r.state = 'opened') THEN
    RAISE EXCEPTION 'nothing is awarded of an enquiry that is not open for it' USING ERRCODE = 'DS001';
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER guarded_enquiry BEFORE INSERT ON awards FOR EACH ROW EXECUTE FUNCTION guard_open_enquiry();--> statement-breakpoint
CREATE TRIGGER guarded_enquiry_decided BEFORE UPDATE ON awards FOR EACH ROW WHEN (NEW.state IN ('approved', 'ordered')) EXECUTE FUNCTION guard_open_enquiry();--> statement-breakpoint
CREATE TRIGGER guarded_enquiry BEFORE INSERT ON purchase_orders FOR EACH ROW EXECUTE FUNCTION guard_open_enquiry();--> statement-breakpoint

-- A moment that is written down is the present one: nothing is dated back or ahead.
CREATE FUNCTION guard_moments() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  present timestamptz := app_now();
  field text;
  stated timestamptz;
BEGIN
  FOREACH field IN ARRAY TG_ARGV LOOP
    stated := (to_jsonb(NEW) ->> field)::timestamptz;
    IF TG_OP = 'UPDATE' THEN
      CONTINUE WHEN to_jsonb(NEW) -> field = to_jsonb(OLD) -> field;
    END IF;
    IF stated < present - interval '5 minutes' OR stated > present + interval '1 second' THEN
      RAISE EXCEPTION '% of % is the present moment', field, TG_TABLE_NAME USING ERRCODE = 'DS001';
    END IF;
  END LOOP;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER dated_now BEFORE INSERT ON audit_entries FOR EACH ROW EXECUTE FUNCTION guard_moments('at');--> statement-breakpoint
CREATE TRIGGER dated_now BEFORE INSERT OR UPDATE ON rfqs FOR EACH ROW EXECUTE FUNCTION guard_moments('issued_at', 'opening_asked_at', 'opened_at');--> statement-breakpoint
CREATE TRIGGER dated_now BEFORE INSERT OR UPDATE ON rfq_invitations FOR EACH ROW EXECUTE FUNCTION guard_moments('issued_at', 'seen_at', 'terms_accepted_at', 'decided_at');--> statement-breakpoint
CREATE TRIGGER dated_now BEFORE INSERT ON rfq_issues FOR EACH ROW EXECUTE FUNCTION guard_moments('issued_at');--> statement-breakpoint
CREATE TRIGGER dated_now BEFORE INSERT ON quotes FOR EACH ROW EXECUTE FUNCTION guard_moments('submitted_at');--> statement-breakpoint
CREATE TRIGGER dated_now BEFORE INSERT OR UPDATE ON quote_states FOR EACH ROW EXECUTE FUNCTION guard_moments('changed_at');--> statement-breakpoint
CREATE TRIGGER dated_now BEFORE INSERT OR UPDATE ON sample_sets FOR EACH ROW EXECUTE FUNCTION guard_moments('uploaded_at', 'confirmed_at');--> statement-breakpoint
CREATE TRIGGER dated_now BEFORE INSERT ON sample_dispositions FOR EACH ROW EXECUTE FUNCTION guard_moments('decided_at');--> statement-breakpoint
CREATE TRIGGER dated_now BEFORE INSERT OR UPDATE ON awards FOR EACH ROW EXECUTE FUNCTION guard_moments('proposed_at', 'decided_at');--> statement-breakpoint
CREATE TRIGGER dated_now BEFORE INSERT ON purchase_orders FOR EACH ROW EXECUTE FUNCTION guard_moments('placed_at');--> statement-breakpoint
CREATE TRIGGER dated_now BEFORE INSERT ON order_acknowledgements FOR EACH ROW EXECUTE FUNCTION guard_moments('answered_at');
