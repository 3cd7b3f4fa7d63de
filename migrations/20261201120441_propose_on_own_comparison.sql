-- The policies of comparisons ask awards, so that a proposal rests on the proposer's own comparison is a trigger's to check.
CREATE FUNCTION guard_proposal() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF NOT EXISTS (SELECT FROM comparisons c WHERE c.id = NEW.comparison_id AND c.created_by = app_person_id()) THEN
    RAISE EXCEPTION 'a proposal rests on the comparison that the proposer froze' USING ERRCODE = 'DS001';
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER guarded_proposal BEFORE INSERT ON awards FOR EACH ROW EXECUTE FUNCTION guard_proposal();--> statement-breakpoint
DROP POLICY awards_propose ON awards;--> statement-breakpoint
CREATE POLICY awards_propose ON awards FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND proposed_by = app_person_id() AND state = 'proposed' AND decided_by IS NULL
  AND app_is_buying() AND app_has_role('buyer') AND rfq_is_opened(rfq_id)
  AND EXISTS (SELECT FROM quotes q WHERE q.id = quote_id AND q.valid_until >= company_today(awards.company_id))
  AND EXISTS (SELECT FROM quote_states s WHERE s.quote_id = awards.quote_id AND s.state = 'submitted')
);
