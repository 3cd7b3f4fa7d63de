import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestDatabase, type TestDatabase } from '../support/database'

let database: TestDatabase
beforeAll(async () => {
  database = await createTestDatabase()
})
afterAll(() => database.drop())

const names = async (text: string) => (await database.query<{ name: string }>(text)).map(({ name }) => name)
const TABLES = "pg_class c WHERE c.relnamespace = 'public'::regnamespace AND c.relkind IN ('r', 'p')"

describe('the catalogue of the database', () => {
  it('shows forced row security on every table', async () => {
    expect((await names(`SELECT relname AS name FROM ${TABLES}`)).length).toBeGreaterThan(15)
    expect(await names(`SELECT relname AS name FROM ${TABLES} AND NOT (relrowsecurity AND relforcerowsecurity)`)).toEqual([])
  })

  it('shows at least one policy on every table', async () => {
    expect(await names(`SELECT relname AS name FROM ${TABLES} AND NOT EXISTS (SELECT FROM pg_policy p WHERE p.polrelid = c.oid)`)).toEqual([])
  })

  it('lets the application see everything of one table only, the clock of the tests', async () => {
    const open = await names(`
      SELECT tablename AS name FROM pg_policies
      WHERE schemaname = 'public' AND (qual = 'true' OR with_check = 'true') AND roles && '{public,dotside_app}'::name[]`)
    expect(open).toEqual(['clock_offset'])
  })

  it('shows that the login roles own nothing and pass over nothing', async () => {
    const roles = await database.query("SELECT rolname, rolsuper, rolbypassrls, rolcreaterole, rolcreatedb FROM pg_roles WHERE rolname LIKE 'dotside\\_%' ORDER BY rolname")
    const weak = { rolsuper: false, rolbypassrls: false, rolcreaterole: false, rolcreatedb: false }
    expect(roles).toEqual(['dotside_app', 'dotside_auth', 'dotside_worker'].map((rolname) => ({ rolname, ...weak })))
    const owned = await names(`
      SELECT relname AS name FROM pg_class WHERE pg_get_userbyid(relowner) LIKE 'dotside\\_%'
      UNION ALL SELECT proname FROM pg_proc WHERE pg_get_userbyid(proowner) LIKE 'dotside\\_%'
      UNION ALL SELECT nspname FROM pg_namespace WHERE pg_get_userbyid(nspowner) LIKE 'dotside\\_%'`)
    expect(owned).toEqual([])
    expect(await names("SELECT m.roleid::regrole::text AS name FROM pg_auth_members m WHERE m.member::regrole::text LIKE 'dotside\\_%'")).toEqual([])
    expect(await names("SELECT r.rolname AS name FROM pg_roles r WHERE r.rolname LIKE 'dotside\\_%' AND has_schema_privilege(r.oid, 'public', 'CREATE')")).toEqual([])
  })

  it('lets no login role truncate, refer to or put a trigger on a table', async () => {
    const strong = await names(`
      SELECT grantee || ' ' || privilege_type || ' ' || table_name AS name FROM information_schema.table_privileges
      WHERE table_schema = 'public' AND (grantee LIKE 'dotside\\_%' OR grantee = 'PUBLIC') AND privilege_type IN ('TRUNCATE', 'REFERENCES', 'TRIGGER')`)
    expect(strong).toEqual([])
  })

  it('keeps the application from what only signing in needs', async () => {
    for (const table of ['credentials', 'sessions', 'sign_in_tokens', 'attempts', 'mail_events']) {
      for (const privilege of ['SELECT', 'UPDATE', 'DELETE']) {
        const [row] = await database.query('SELECT has_any_column_privilege($1, $2, $3) AS allowed', ['dotside_app', table, privilege === 'DELETE' ? 'SELECT' : privilege])
        expect([table, privilege, row!.allowed]).toEqual([table, privilege, false])
      }
    }
  })

  it('shows no function that runs with other rights than its caller’s', async () => {
    expect(await names("SELECT proname AS name FROM pg_proc WHERE pronamespace = 'public'::regnamespace AND prosecdef")).toEqual([])
  })

  it('shows that every view looks with the rights of who asks', async () => {
    expect(await names("SELECT relname AS name FROM pg_class WHERE relnamespace = 'public'::regnamespace AND relkind = 'v' AND NOT coalesce(reloptions::text LIKE '%security_invoker=true%', false)")).toEqual([])
    expect(await names("SELECT relname AS name FROM pg_class WHERE relnamespace = 'public'::regnamespace AND relkind = 'm'")).toEqual([])
  })

  it('shows an index behind every foreign key', async () => {
    expect(
      await names(`
        SELECT c.conrelid::regclass || '.' || c.conname AS name FROM pg_constraint c
        WHERE c.contype = 'f' AND c.connamespace = 'public'::regnamespace AND NOT EXISTS (
          SELECT FROM pg_index i
          WHERE i.indrelid = c.conrelid AND i.indpred IS NULL
            AND (SELECT array_agg(k ORDER BY k) FROM unnest((i.indkey::int2[])[0:cardinality(c.conkey) - 1]) k) = (SELECT array_agg(k ORDER BY k) FROM unnest(c.conkey) k))`),
    ).toEqual([])
  })

  it('shows no sequence whose numbers a vendor could count', async () => {
    expect(await names("SELECT relname AS name FROM pg_class WHERE relnamespace = 'public'::regnamespace AND relkind = 'S'")).toEqual([])
  })
})
