-- Who acts, as the transaction says it. An absent or empty setting is nobody, who sees nothing.
CREATE FUNCTION app_person_id() RETURNS uuid LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT nullif(current_setting('app.person_id', true), '')::uuid $$;--> statement-breakpoint
CREATE FUNCTION app_company_id() RETURNS uuid LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT nullif(current_setting('app.company_id', true), '')::uuid $$;--> statement-breakpoint
CREATE FUNCTION app_company_kind() RETURNS text LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT coalesce(current_setting('app.company_kind', true), '') $$;--> statement-breakpoint
CREATE FUNCTION app_roles() RETURNS text[] LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT string_to_array(coalesce(current_setting('app.roles', true), ''), ',') $$;--> statement-breakpoint
CREATE FUNCTION app_has_role(VARIADIC wanted text[]) RETURNS boolean LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT app_roles() && wanted $$;--> statement-breakpoint
CREATE FUNCTION app_is_buying() RETURNS boolean LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT app_company_kind() = 'buying' $$;--> statement-breakpoint
CREATE FUNCTION app_is_vendor() RETURNS boolean LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT app_company_kind() = 'vendor' AND app_has_role('vendor') $$;--> statement-breakpoint
CREATE FUNCTION app_is_operator() RETURNS boolean LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT app_company_kind() = 'operator' AND app_has_role('operator') $$;--> statement-breakpoint

-- The one clock that rules about time are decided by. The offset counts in test databases only.
CREATE FUNCTION app_now() RETURNS timestamptz LANGUAGE plpgsql VOLATILE PARALLEL RESTRICTED AS $$
BEGIN
  IF right(current_database(), 5) = '_test' THEN
    RETURN clock_timestamp() + make_interval(secs => (SELECT seconds FROM clock_offset));
  END IF;
  RETURN clock_timestamp();
END $$;--> statement-breakpoint

-- Called once for every new table: row security for everybody, the owner included, and no rights left over.
CREATE FUNCTION protect_table(target regclass) RETURNS void LANGUAGE plpgsql AS $$
BEGIN
  EXECUTE format('ALTER TABLE %s ENABLE ROW LEVEL SECURITY', target);
  EXECUTE format('ALTER TABLE %s FORCE ROW LEVEL SECURITY', target);
  EXECUTE format('REVOKE ALL ON %s FROM PUBLIC, dotside_auth, dotside_app, dotside_worker', target);
END $$;--> statement-breakpoint

-- Refuses the change, unless only the columns named as arguments differ. SQLSTATE DS001 is ours.
CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF TG_OP = 'UPDATE' AND to_jsonb(OLD) - TG_ARGV::text[] = to_jsonb(NEW) - TG_ARGV::text[] THEN
    RETURN NEW;
  END IF;
  RAISE EXCEPTION '% of an immutable row of %', lower(TG_OP), TG_TABLE_NAME USING ERRCODE = 'DS001';
END $$;--> statement-breakpoint

-- Rows of the table are written once and never changed or deleted.
CREATE FUNCTION make_append_only(target regclass) RETURNS void LANGUAGE plpgsql AS $$
BEGIN
  EXECUTE format('CREATE TRIGGER append_only BEFORE UPDATE OR DELETE ON %s FOR EACH ROW EXECUTE FUNCTION refuse_change()', target);
  EXECUTE format('CREATE TRIGGER append_only_whole BEFORE TRUNCATE ON %s FOR EACH STATEMENT EXECUTE FUNCTION refuse_change()', target);
END $$;--> statement-breakpoint

-- Rows for which the condition on OLD holds are immutable, except for the columns named,
-- e.g. SELECT freeze_rows('specification_revisions', 'OLD.state <> ''draft''', 'state', 'superseded_at').
CREATE FUNCTION freeze_rows(target regclass, condition text, VARIADIC changeable text[] DEFAULT ARRAY[]::text[]) RETURNS void LANGUAGE plpgsql AS $$
BEGIN
  EXECUTE format(
    'CREATE TRIGGER frozen BEFORE UPDATE OR DELETE ON %s FOR EACH ROW WHEN (%s) EXECUTE FUNCTION refuse_change(%s)',
    target, condition, (SELECT coalesce(string_agg(quote_literal(c), ', '), '') FROM unnest(changeable) c));
  EXECUTE format('CREATE TRIGGER frozen_whole BEFORE TRUNCATE ON %s FOR EACH STATEMENT EXECUTE FUNCTION refuse_change()', target);
END $$;--> statement-breakpoint
REVOKE EXECUTE ON FUNCTION protect_table(regclass), make_append_only(regclass), freeze_rows(regclass, text, text[]) FROM PUBLIC;--> statement-breakpoint

INSERT INTO clock_offset DEFAULT VALUES;--> statement-breakpoint
SELECT protect_table('clock_offset');--> statement-breakpoint
GRANT SELECT ON clock_offset TO dotside_auth, dotside_app, dotside_worker;--> statement-breakpoint
CREATE POLICY clock_offset_everybody ON clock_offset FOR SELECT USING (true);--> statement-breakpoint

-- Companies: the own one; a vendor sees who invited it; a buying company sees a vendor that accepted.
SELECT protect_table('companies');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE ON companies TO dotside_auth;--> statement-breakpoint
GRANT SELECT ON companies TO dotside_worker;--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (name, country, time_zone, currency, address) ON companies TO dotside_app;--> statement-breakpoint
CREATE POLICY companies_auth ON companies TO dotside_auth USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY companies_worker ON companies FOR SELECT TO dotside_worker USING (true);--> statement-breakpoint
CREATE POLICY companies_read ON companies FOR SELECT TO dotside_app USING (
  id = (SELECT app_company_id())
  OR (SELECT app_is_operator())
  OR EXISTS (SELECT FROM vendor_links l WHERE l.vendor_company_id = (SELECT app_company_id()) AND l.buying_company_id = companies.id)
  OR EXISTS (SELECT FROM vendor_links l WHERE l.buying_company_id = (SELECT app_company_id()) AND l.vendor_company_id = companies.id AND l.accepted_at IS NOT NULL)
);--> statement-breakpoint
CREATE POLICY companies_create ON companies FOR INSERT TO dotside_app WITH CHECK (
  (kind = 'vendor' AND app_is_buying() AND app_has_role('admin')) OR (kind = 'buying' AND app_is_operator())
);--> statement-breakpoint
CREATE POLICY companies_update ON companies FOR UPDATE TO dotside_app
  USING (id = (SELECT app_company_id()) AND app_has_role('admin', 'vendor', 'operator'));--> statement-breakpoint

-- Memberships decide who sees whom.
SELECT protect_table('memberships');--> statement-breakpoint
GRANT SELECT, INSERT ON memberships TO dotside_auth;--> statement-breakpoint
GRANT SELECT ON memberships TO dotside_worker;--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (roles, approval_limit, approval_currency) ON memberships TO dotside_app;--> statement-breakpoint
CREATE POLICY memberships_auth ON memberships TO dotside_auth USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY memberships_worker ON memberships FOR SELECT TO dotside_worker USING (true);--> statement-breakpoint
CREATE POLICY memberships_read ON memberships FOR SELECT TO dotside_app USING (
  company_id = (SELECT app_company_id())
  OR (SELECT app_is_operator())
  OR EXISTS (SELECT FROM vendor_links l WHERE l.buying_company_id = (SELECT app_company_id()) AND l.vendor_company_id = company_id AND l.accepted_at IS NOT NULL)
);--> statement-breakpoint
-- A buying company may add the first contact of a new vendor and nobody after: the unique index on first contacts holds that.
CREATE POLICY memberships_create ON memberships FOR INSERT TO dotside_app WITH CHECK (
  (company_id = app_company_id() AND app_has_role('admin', 'vendor', 'operator') AND NOT is_first_contact)
  OR (company_kind = 'vendor' AND is_first_contact AND app_is_buying() AND app_has_role('admin'))
  OR (company_kind = 'buying' AND is_first_contact AND roles = ARRAY['admin'] AND app_is_operator())
);--> statement-breakpoint
-- Roles change only while the acting person is the second person of a confirmed request that says just this.
CREATE POLICY memberships_update ON memberships FOR UPDATE TO dotside_app
  USING (EXISTS (
    SELECT FROM change_requests c
    WHERE c.person_id = memberships.person_id AND c.state = 'confirmed' AND c.decided_by = app_person_id() AND c.change ->> 'kind' = 'roles'
  ))
  WITH CHECK (EXISTS (
    SELECT FROM change_requests c
    WHERE c.person_id = memberships.person_id AND c.state = 'confirmed' AND c.decided_by = app_person_id() AND c.change ->> 'kind' = 'roles'
      AND ARRAY(SELECT jsonb_array_elements_text(c.change -> 'roles')) = memberships.roles
      AND (c.change ->> 'approvalLimit')::numeric IS NOT DISTINCT FROM approval_limit
      AND (c.change ->> 'approvalCurrency') IS NOT DISTINCT FROM approval_currency
  ));--> statement-breakpoint

-- People are visible as far as their memberships are.
SELECT protect_table('people');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE ON people TO dotside_auth;--> statement-breakpoint
GRANT SELECT ON people TO dotside_worker;--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (left_at, sessions_valid_after) ON people TO dotside_app;--> statement-breakpoint
CREATE POLICY people_auth ON people TO dotside_auth USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY people_worker ON people FOR SELECT TO dotside_worker USING (true);--> statement-breakpoint
CREATE POLICY people_read ON people FOR SELECT TO dotside_app USING (
  id = (SELECT app_person_id()) OR EXISTS (SELECT FROM memberships m WHERE m.person_id = people.id)
);--> statement-breakpoint
CREATE POLICY people_create ON people FOR INSERT TO dotside_app WITH CHECK (
  invited_by = app_person_id() AND accepted_at IS NULL AND app_has_role('admin', 'vendor', 'operator')
);--> statement-breakpoint
CREATE POLICY people_update ON people FOR UPDATE TO dotside_app USING (EXISTS (
  SELECT FROM change_requests c WHERE c.person_id = people.id AND c.state = 'confirmed' AND c.decided_by = app_person_id()
));--> statement-breakpoint

SELECT protect_table('change_requests');--> statement-breakpoint
GRANT SELECT, UPDATE ON change_requests TO dotside_auth;--> statement-breakpoint
GRANT SELECT ON change_requests TO dotside_worker;--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (state, decided_by, decided_at) ON change_requests TO dotside_app;--> statement-breakpoint
CREATE POLICY change_requests_auth ON change_requests TO dotside_auth USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY change_requests_worker ON change_requests FOR SELECT TO dotside_worker USING (true);--> statement-breakpoint
CREATE POLICY change_requests_read ON change_requests FOR SELECT TO dotside_app
  USING (company_id = (SELECT app_company_id()) OR (SELECT app_is_operator()));--> statement-breakpoint
CREATE POLICY change_requests_create ON change_requests FOR INSERT TO dotside_app WITH CHECK (
  company_id = app_company_id() AND requested_by = app_person_id() AND state = 'requested' AND app_has_role('admin', 'vendor', 'operator')
  AND EXISTS (SELECT FROM memberships m WHERE m.person_id = change_requests.person_id AND m.company_id = app_company_id())
);--> statement-breakpoint
CREATE POLICY change_requests_decide ON change_requests FOR UPDATE TO dotside_app
  USING (
    (company_id = (SELECT app_company_id()) AND app_has_role('admin', 'quality', 'approver', 'vendor', 'operator') OR (SELECT app_is_operator()))
    AND (state = 'requested' OR (state = 'confirmed' AND decided_by = app_person_id()))
  )
  WITH CHECK (decided_by = app_person_id());--> statement-breakpoint
SELECT freeze_rows('change_requests', 'OLD.state IN (''refused'', ''done'')');--> statement-breakpoint

-- What only signing in needs.
SELECT protect_table('credentials'), protect_table('sessions'), protect_table('sign_in_tokens'), protect_table('attempts');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE, DELETE ON credentials, sessions, sign_in_tokens, attempts TO dotside_auth;--> statement-breakpoint
CREATE POLICY credentials_auth ON credentials TO dotside_auth USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY sessions_auth ON sessions TO dotside_auth USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY sign_in_tokens_auth ON sign_in_tokens TO dotside_auth USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY attempts_auth ON attempts TO dotside_auth USING (true) WITH CHECK (true);--> statement-breakpoint
-- The worker makes the token when it sends the mail that carries it.
GRANT INSERT ON sign_in_tokens TO dotside_worker;--> statement-breakpoint
CREATE POLICY sign_in_tokens_worker ON sign_in_tokens FOR INSERT TO dotside_worker WITH CHECK (true);--> statement-breakpoint

SELECT protect_table('vendor_links');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE ON vendor_links TO dotside_auth;--> statement-breakpoint
GRANT SELECT ON vendor_links TO dotside_worker;--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (accepted_at) ON vendor_links TO dotside_app;--> statement-breakpoint
CREATE POLICY vendor_links_auth ON vendor_links TO dotside_auth USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY vendor_links_worker ON vendor_links FOR SELECT TO dotside_worker USING (true);--> statement-breakpoint
CREATE POLICY vendor_links_read ON vendor_links FOR SELECT TO dotside_app
  USING (buying_company_id = (SELECT app_company_id()) OR vendor_company_id = (SELECT app_company_id()));--> statement-breakpoint
CREATE POLICY vendor_links_create ON vendor_links FOR INSERT TO dotside_app
  WITH CHECK (buying_company_id = app_company_id() AND app_is_buying() AND app_has_role('admin') AND accepted_at IS NULL);--> statement-breakpoint
CREATE POLICY vendor_links_accept ON vendor_links FOR UPDATE TO dotside_app
  USING (vendor_company_id = (SELECT app_company_id()) AND app_is_vendor()) WITH CHECK (vendor_company_id = app_company_id() AND accepted_at IS NOT NULL);--> statement-breakpoint

SELECT protect_table('vendor_relations');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (agreement_file_id, name, approval, confidentiality_agreed_on, confidentiality_expires_on, notes) ON vendor_relations TO dotside_app;--> statement-breakpoint
CREATE POLICY vendor_relations_read ON vendor_relations FOR SELECT TO dotside_app
  USING (buying_company_id = (SELECT app_company_id()) AND (SELECT app_is_buying()));--> statement-breakpoint
CREATE POLICY vendor_relations_create ON vendor_relations FOR INSERT TO dotside_app
  WITH CHECK (buying_company_id = app_company_id() AND app_is_buying() AND app_has_role('admin'));--> statement-breakpoint
CREATE POLICY vendor_relations_update ON vendor_relations FOR UPDATE TO dotside_app
  USING (buying_company_id = (SELECT app_company_id()) AND app_is_buying() AND app_has_role('buyer', 'quality'));--> statement-breakpoint

-- Audit: append-only for everybody. Who reads what follows the area; sealed entries wait for their own policy.
SELECT protect_table('audit_entries'), make_append_only('audit_entries');--> statement-breakpoint
GRANT INSERT ON audit_entries TO dotside_auth;--> statement-breakpoint
GRANT SELECT, INSERT ON audit_entries TO dotside_app, dotside_worker;--> statement-breakpoint
CREATE POLICY audit_entries_auth ON audit_entries FOR INSERT TO dotside_auth WITH CHECK (true);--> statement-breakpoint
CREATE POLICY audit_entries_worker_read ON audit_entries FOR SELECT TO dotside_worker USING (true);--> statement-breakpoint
CREATE POLICY audit_entries_worker_write ON audit_entries FOR INSERT TO dotside_worker WITH CHECK (actor_person_id IS NULL);--> statement-breakpoint
CREATE POLICY audit_entries_read ON audit_entries FOR SELECT TO dotside_app USING (
  (company_id = (SELECT app_company_id()) AND sealed_by IS NULL AND (SELECT app_is_buying()) AND (
    (SELECT app_has_role('buyer', 'approver'))
    OR (area = 'engineering' AND (SELECT app_has_role('engineer', 'checker', 'quality')))
    OR (area = 'account' AND (SELECT app_has_role('admin')))
  ))
  OR ((SELECT app_is_vendor()) AND (actor_company_id = (SELECT app_company_id()) OR company_id = (SELECT app_company_id())))
  OR ((SELECT app_is_operator()) AND area = 'account')
  OR actor_person_id = (SELECT app_person_id())
);--> statement-breakpoint
CREATE POLICY audit_entries_write ON audit_entries FOR INSERT TO dotside_app WITH CHECK (
  actor_person_id = app_person_id() AND actor_company_id = app_company_id() AND (
    company_id = app_company_id()
    OR app_is_operator()
    OR EXISTS (SELECT FROM vendor_links l WHERE l.buying_company_id = audit_entries.company_id AND l.vendor_company_id = app_company_id())
    OR EXISTS (SELECT FROM vendor_links l WHERE l.buying_company_id = app_company_id() AND l.vendor_company_id = audit_entries.company_id)
  )
);--> statement-breakpoint
SELECT protect_table('audit_chain'), make_append_only('audit_chain');--> statement-breakpoint
GRANT SELECT, INSERT ON audit_chain TO dotside_worker;--> statement-breakpoint
CREATE POLICY audit_chain_worker ON audit_chain TO dotside_worker USING (true) WITH CHECK (true);--> statement-breakpoint
-- The application reads which hash belongs to an entry it may read, and the head's hash; never a count.
GRANT SELECT (entry_id, hash) ON audit_chain TO dotside_app;--> statement-breakpoint
CREATE POLICY audit_chain_read ON audit_chain FOR SELECT TO dotside_app
  USING (EXISTS (SELECT FROM audit_entries e WHERE e.id = audit_chain.entry_id));--> statement-breakpoint
INSERT INTO audit_chain_head (position, hash) VALUES (0, sha256('dotside'));--> statement-breakpoint
SELECT protect_table('audit_chain_head');--> statement-breakpoint
GRANT SELECT, UPDATE ON audit_chain_head TO dotside_worker;--> statement-breakpoint
GRANT SELECT (hash) ON audit_chain_head TO dotside_app;--> statement-breakpoint
CREATE POLICY audit_chain_head_worker ON audit_chain_head TO dotside_worker USING (true);--> statement-breakpoint
CREATE POLICY audit_chain_head_read ON audit_chain_head FOR SELECT TO dotside_app USING ((SELECT app_is_buying()));--> statement-breakpoint

-- Mail: written with the fact, read by the worker; the causing company sees what could not be delivered.
SELECT protect_table('mail_events');--> statement-breakpoint
GRANT INSERT ON mail_events TO dotside_auth, dotside_app;--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE (expanded_at) ON mail_events TO dotside_worker;--> statement-breakpoint
CREATE POLICY mail_events_auth ON mail_events FOR INSERT TO dotside_auth WITH CHECK (true);--> statement-breakpoint
CREATE POLICY mail_events_app ON mail_events FOR INSERT TO dotside_app WITH CHECK (company_id = app_company_id());--> statement-breakpoint
CREATE POLICY mail_events_worker ON mail_events TO dotside_worker USING (true) WITH CHECK (true);--> statement-breakpoint
SELECT protect_table('outbox_mails');--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE ON outbox_mails TO dotside_worker;--> statement-breakpoint
GRANT SELECT, UPDATE (state, attempts, next_attempt_at) ON outbox_mails TO dotside_app;--> statement-breakpoint
CREATE POLICY outbox_mails_worker ON outbox_mails TO dotside_worker USING (true) WITH CHECK (true);--> statement-breakpoint
CREATE POLICY outbox_mails_read ON outbox_mails FOR SELECT TO dotside_app USING (
  (company_id = (SELECT app_company_id()) AND (SELECT app_has_role('buyer', 'admin', 'vendor'))) OR (SELECT app_is_operator())
);--> statement-breakpoint
CREATE POLICY outbox_mails_retry ON outbox_mails FOR UPDATE TO dotside_app
  USING (state = 'undeliverable' AND ((company_id = (SELECT app_company_id()) AND app_has_role('buyer', 'admin', 'vendor')) OR (SELECT app_is_operator())))
  WITH CHECK (state = 'waiting');--> statement-breakpoint

-- Files: the uploading company's, but not for who only manages accounts. Features open more to others.
SELECT protect_table('files'), make_append_only('files');--> statement-breakpoint
GRANT SELECT, INSERT ON files TO dotside_app;--> statement-breakpoint
GRANT SELECT ON files TO dotside_worker;--> statement-breakpoint
CREATE POLICY files_worker ON files FOR SELECT TO dotside_worker USING (true);--> statement-breakpoint
CREATE POLICY files_read ON files FOR SELECT TO dotside_app USING (
  company_id = (SELECT app_company_id()) AND (SELECT app_has_role('engineer', 'checker', 'quality', 'buyer', 'approver', 'vendor'))
);--> statement-breakpoint
CREATE POLICY files_create ON files FOR INSERT TO dotside_app WITH CHECK (company_id = app_company_id() AND uploaded_by = app_person_id());
