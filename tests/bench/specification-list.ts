/**
 * The first page of 10 000 specifications, as a multiple of the bare SQL that fetches fifty rows of one table in the order of an index,
 * on one connection. Needs a throw-away PostgreSQL server in TEST_DATABASE_URL; says so and stops without one.
 */
import { mkdirSync, writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { parseConfig } from '#server/config'
import { closeContext, createContext } from '#server/context'
import { asActor, type Actor } from '#server/db/as-actor'
import { ensureRoles, migrate } from '#server/db/migrate'
import { createLogger } from '#server/logger'
import { listSpecifications } from '#server/services/specifications/list-page'
import type { SPECIFICATION_SORTS } from '#shared/contracts/specifications'
import { sql } from 'drizzle-orm'
import { randomUUID } from 'node:crypto'
import { tmpdir } from 'node:os'
import pg, { Client } from 'pg'
import { databaseUrls } from '../support/template-database'

const PARTS = 10_000
const FOLDER = fileURLToPath(new URL('../../node_modules/.cache/bench/', import.meta.url))
const BASE = { search: '', offset: 0, limit: 50, sort: '-updatedAt' as (typeof SPECIFICATION_SORTS)[number] }

async function leastMs(work: () => Promise<unknown>, runs: number): Promise<number> {
  await work()
  let least = Infinity
  for (let run = 0; run < runs; run++) {
    const start = performance.now()
    await work()
    least = Math.min(least, performance.now() - start)
  }
  return least
}

const DATABASE = `dotside_bench_${process.pid}_test`

/** A migrated database for the time of the measurement. */
async function withDatabase(maintenanceUrl: string, work: (urls: ReturnType<typeof databaseUrls>, owner: Client) => Promise<void>): Promise<void> {
  const name = pg.escapeIdentifier(DATABASE)
  const maintenance = new Client({ connectionString: maintenanceUrl })
  await maintenance.connect()
  await maintenance.query(`CREATE DATABASE ${name} TEMPLATE template0 ENCODING 'UTF8' LC_COLLATE 'C.UTF-8' LC_CTYPE 'C.UTF-8'`)
  const urls = databaseUrls(maintenanceUrl, DATABASE)
  await ensureRoles(maintenance, urls)
  await migrate(urls)
  const owner = new Client({ connectionString: urls.DATABASE_OWNER_URL })
  await owner.connect()
  try {
    await work(urls, owner)
  } finally {
    await owner.end()
    await maintenance.query(`DROP DATABASE ${name} WITH (FORCE)`)
    await maintenance.end()
  }
}

/** Parts with three revisions each, two of them given up. */
async function fill(owner: Client, { companyId, personId }: Actor): Promise<void> {
  await owner.query(`INSERT INTO companies (id, kind, name, time_zone) VALUES ($1, 'buying', 'Bench', 'UTC')`, [companyId])
  await owner.query(`INSERT INTO people (id, name, email, sessions_valid_after) VALUES ($1, 'Bench', 'bench@example.test', now())`, [personId])
  await owner.query(
    `INSERT INTO specifications (company_id, owner_id, part_number, title)
      SELECT $1, $2, 'T-' || lpad(n::text, 6, '0'), 'Transformer ' || md5(n::text) FROM generate_series(1, $3::int) n`,
    [companyId, personId, PARTS],
  )
  await owner.query(`
    INSERT INTO specification_revisions (specification_id, company_id, created_by, editor_ids, draft_number, state, document, topology, figures, search_text, updated_at)
      SELECT s.id, s.company_id, s.owner_id, ARRAY[s.owner_id], d, CASE WHEN d = 3 THEN 'draft' ELSE 'withdrawn' END, '{}'::bytea, 'flyback',
        jsonb_build_object('core', 'e20', 'windings', 3), ' ' || lower(s.title) || (SELECT string_agg(' ' || left(md5(s.part_number || w), 9), '') FROM generate_series(1, 250) w), now() - random() * interval '900 days'
      FROM specifications s, generate_series(1, 3) d`)
  await owner.query('ANALYZE')
}

async function measure(maintenanceUrl: string): Promise<void> {
  await withDatabase(maintenanceUrl, async (urls, owner) => {
    const actor: Actor = { personId: randomUUID(), companyId: randomUUID(), companyKind: 'buying', roles: ['engineer'] }
    await fill(owner, actor)
    const ctx = createContext(parseConfig({ ...urls, DATA_DIR: tmpdir(), PUBLIC_URL: 'http://bench.test', MAIL_FROM: 'Bench <bench@bench.test>' }), { logger: createLogger(() => undefined) })
    const list = (query: Partial<typeof BASE>) => () => asActor(ctx, actor, (tx) => listSpecifications(tx, actor, { ...BASE, ...query }))
    const unitMs = await leastMs(() => asActor(ctx, actor, (tx) => tx.execute(sql`SELECT id, part_number, title FROM specifications ORDER BY part_number LIMIT 50`)), 20)
    const cases = [['first page', list({})], ['by number', list({ sort: 'partNumber' })], ['page 100', list({ offset: 4950 })], ['search by words', list({ search: 'transformer c4ca4238' })]] as const
    const rows = []
    for (const [name, work] of cases) {
      const ms = await leastMs(work, 10)
      rows.push({ name, ms, ratio: ms / unitMs })
    }
    await closeContext(ctx)
    show(unitMs, rows)
  })
}

function show(unitMs: number, rows: { name: string; ms: number; ratio: number }[]): void {
  console.log(`list of ${PARTS} specifications: multiples of fifty rows in the order of an index (${unitMs.toFixed(2)} ms here)`)
  for (const { name, ms, ratio } of rows) console.log(`${name.padEnd(40)} ${ratio.toFixed(1).padStart(8)}  ${ms.toFixed(1).padStart(8)} ms`)
  mkdirSync(FOLDER, { recursive: true })
  writeFileSync(`${FOLDER}specification-list.json`, `${JSON.stringify({ unitMs, rows }, null, 2)}\n`)
}

if (process.env.TEST_DATABASE_URL) await measure(process.env.TEST_DATABASE_URL)
else console.log('list of specifications: not measured, TEST_DATABASE_URL names no server')
