-- That a row refers to a file of the acting company is checked by a trigger: the policies of files ask these tables.
CREATE FUNCTION guard_own_file() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  referred jsonb := to_jsonb(NEW);
BEGIN
  IF NOT EXISTS (
    SELECT FROM files f WHERE f.id = (referred ->> TG_ARGV[0])::uuid AND f.company_id = app_company_id()
      AND (TG_NARGS < 2 OR f.sha256 = referred ->> TG_ARGV[1])
  ) THEN
    RAISE EXCEPTION 'the file of a row of % is the acting company''s', TG_TABLE_NAME USING ERRCODE = 'DS001';
  END IF;
  RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER own_file BEFORE INSERT ON sample_sets FOR EACH ROW EXECUTE FUNCTION guard_own_file('file_id', 'file_sha256');--> statement-breakpoint
CREATE TRIGGER own_file BEFORE INSERT ON sample_evidence FOR EACH ROW EXECUTE FUNCTION guard_own_file('file_id');--> statement-breakpoint
CREATE TRIGGER own_file BEFORE INSERT ON purchase_orders FOR EACH ROW EXECUTE FUNCTION guard_own_file('pdf_file_id', 'pdf_sha256');--> statement-breakpoint
DROP POLICY sample_sets_create ON sample_sets;--> statement-breakpoint
CREATE POLICY sample_sets_create ON sample_sets FOR INSERT TO dotside_app WITH CHECK (
  vendor_company_id = app_company_id() AND uploaded_by = app_person_id() AND app_is_vendor() AND phase = 'read' AND confirmed_at IS NULL
  AND EXISTS (SELECT FROM sample_requests r WHERE r.id = request_id AND r.cancelled_at IS NULL)
);--> statement-breakpoint
DROP POLICY sample_evidence_create ON sample_evidence;--> statement-breakpoint
CREATE POLICY sample_evidence_create ON sample_evidence FOR INSERT TO dotside_app WITH CHECK (
  vendor_company_id = app_company_id() AND app_is_vendor()
  AND EXISTS (SELECT FROM sample_sets s WHERE s.id = set_id AND s.phase = 'read' AND s.vendor_company_id = app_company_id())
);--> statement-breakpoint
DROP POLICY purchase_orders_place ON purchase_orders;--> statement-breakpoint
CREATE POLICY purchase_orders_place ON purchase_orders FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND placed_by = app_person_id() AND app_is_buying() AND app_has_role('buyer')
  AND EXISTS (SELECT FROM awards a WHERE a.id = award_id AND a.state = 'approved')
);
