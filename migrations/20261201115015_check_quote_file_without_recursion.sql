-- Whose file it is, asked in a function: as a subquery of the policy it would lead from quotes to files and back.
CREATE FUNCTION app_owns_file(file uuid) RETURNS boolean LANGUAGE sql STABLE
  AS $$ SELECT EXISTS (SELECT FROM files f WHERE f.id = file AND f.company_id = app_company_id()) $$;--> statement-breakpoint
DROP POLICY quotes_submit ON quotes;--> statement-breakpoint
CREATE POLICY quotes_submit ON quotes FOR INSERT TO dotside_app WITH CHECK (
  vendor_company_id = app_company_id() AND submitted_by = app_person_id() AND app_is_vendor() AND rfq_takes_quotes(rfq_id)
  AND EXISTS (SELECT FROM rfq_invitations i WHERE i.id = invitation_id AND i.terms_accepted_at IS NOT NULL)
  AND (file_id IS NULL OR app_owns_file(file_id))
);
