-- A revision goes its way in one direction: what was released never becomes a draft again, what was withdrawn never anything.
CREATE FUNCTION guard_specification_revision_state() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF NEW.state <> OLD.state AND (OLD.state, NEW.state) NOT IN (
    ('draft', 'in-check'), ('draft', 'withdrawn'), ('in-check', 'draft'), ('in-check', 'released'),
    ('released', 'superseded'), ('released', 'withdrawn'), ('superseded', 'withdrawn')
  ) THEN
    RAISE EXCEPTION 'a revision does not go from % to %', OLD.state, NEW.state USING ERRCODE = 'DS001';
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER guarded_state BEFORE UPDATE OF state ON specification_revisions FOR EACH ROW EXECUTE FUNCTION guard_specification_revision_state();
