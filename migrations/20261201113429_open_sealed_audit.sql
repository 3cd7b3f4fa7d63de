-- What a vendor did under seal is read by purchasing once the enquiry is opened.
CREATE POLICY audit_entries_read_opened ON audit_entries FOR SELECT TO dotside_app USING (
  company_id = (SELECT app_company_id()) AND sealed_by IS NOT NULL AND (SELECT app_is_buying() AND app_has_role('buyer', 'approver')) AND rfq_is_opened(sealed_by)
);
