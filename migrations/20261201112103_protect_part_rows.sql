-- The parts library: shipped rows for every buying company, own rows for the own one; vendors and account managers see none.
SELECT protect_table('part_rows'), make_append_only('part_rows');--> statement-breakpoint
GRANT SELECT, INSERT ON part_rows TO dotside_app;--> statement-breakpoint
CREATE POLICY part_rows_read ON part_rows FOR SELECT TO dotside_app
  USING ((company_id IS NULL OR company_id = (SELECT app_company_id())) AND (SELECT app_reads_engineering()));--> statement-breakpoint
CREATE POLICY part_rows_create ON part_rows FOR INSERT TO dotside_app
  WITH CHECK (company_id = app_company_id() AND created_by = app_person_id() AND app_is_buying() AND app_has_role('engineer'));--> statement-breakpoint
-- Whoever installs ships the shared rows, and reads no company's own.
CREATE POLICY part_rows_ship ON part_rows TO CURRENT_USER USING (company_id IS NULL) WITH CHECK (company_id IS NULL);
