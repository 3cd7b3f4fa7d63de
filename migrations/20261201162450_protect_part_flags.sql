-- What a company says about rows of the library: read with the library, set by its engineers, nobody else's.
SELECT protect_table('part_flags');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (preferred, stocked, updated_by, updated_at) ON part_flags TO dotside_app;--> statement-breakpoint
CREATE POLICY part_flags_read ON part_flags FOR SELECT TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND (SELECT app_reads_engineering()));--> statement-breakpoint
CREATE POLICY part_flags_create ON part_flags FOR INSERT TO dotside_app
  WITH CHECK (company_id = app_company_id() AND updated_by = app_person_id() AND app_is_buying() AND app_has_role('engineer'));--> statement-breakpoint
CREATE POLICY part_flags_change ON part_flags FOR UPDATE TO dotside_app
  USING (company_id = (SELECT app_company_id()) AND app_is_buying() AND app_has_role('engineer'))
  WITH CHECK (company_id = app_company_id() AND updated_by = app_person_id());
