import type { Context } from '#server/context'
import { appNow, asActor, type Actor } from '#server/db/as-actor'
import { rfqs } from '#server/db/schema/index'
import { saveReport } from '#server/services/samples/answer-questions'
import { confirmSet } from '#server/services/samples/confirm-set'
import { expectedRows } from '#server/services/samples/expected-rows'
import { releaseBytes } from '#server/services/samples/find-samples'
import { listSampleRequests, readSampleRequest } from '#server/services/samples/list-samples'
import { requestSamples } from '#server/services/samples/request-samples'
import { uploadReport } from '#server/services/samples/upload-report'
import { readRfq } from '#server/services/rfqs/read-rfq'
import type { SampleReport, SampleRequest } from '#shared/contracts/samples'
import { reportTemplate } from '#shared/measurement/report-template'
import { eq } from 'drizzle-orm'
import { createHash, randomUUID } from 'node:crypto'
import { mkdir, writeFile } from 'node:fs/promises'
import path from 'node:path'
import { demoActor } from './people'
import { DEMO_RFQS } from './rfqs'

const SERIALS = ['S1', 'S2', 'S3', 'S4', 'S5']
/** How far each part lies between the middle and the edge of its limits; the last one's leakage lies outside. */
const PLACES = [0.12, -0.2, 0.31, 0.05, -0.14]

/** Five samples of the opened enquiry, measured by their vendor and waiting for quality's verdict. */
export async function seedSamples(ctx: Context): Promise<void> {
  const joris = await demoActor(ctx, 'joris.pell@brightmoor.example')
  const greta = await demoActor(ctx, 'greta.tamsen@tamsen.example')
  const wanted = await ensureRequest(ctx, joris, greta)
  if (wanted.state !== 'requested') return

  const set = await uploadReport(ctx, greta, wanted.id, await staged(ctx, 'BM-T1180-samples.csv', await measuredTable(ctx, joris, wanted.releaseId)))
  const saved = await saveReport(ctx, greta, set.id, set.version, await declaration(ctx, greta))
  await confirmSet(ctx, greta, set.id, saved.version)
}

async function ensureRequest(ctx: Context, buyer: Actor, vendor: Actor): Promise<SampleRequest> {
  return asActor(ctx, buyer, async (tx) => {
    const [row] = await tx.select({ id: rfqs.id }).from(rfqs).where(eq(rfqs.title, DEMO_RFQS.opened))
    const rfq = await readRfq(tx, buyer, row!.id)
    const [present] = await listSampleRequests(tx, buyer, rfq.id)
    if (present) return readSampleRequest(tx, buyer, present.id)
    const dueOn = new Date((await appNow(tx)).getTime() + 21 * 86_400_000).toISOString().slice(0, 10)
    return requestSamples(tx, buyer, { rfqId: rfq.id, lineId: rfq.lines[0]!.id, vendorCompanyId: vendor.companyId, quantity: SERIALS.length, sampleKind: 'hand-made', dueOn, note: 'Numbered parts, please; we measure them again.' })
  })
}

/** The released test table, filled in: every reading inside its limits but one leakage. */
async function measuredTable(ctx: Context, buyer: Actor, releaseId: string): Promise<string> {
  const rows = expectedRows(await asActor(ctx, buyer, (tx) => releaseBytes(tx, releaseId)))
  const [heads, minima, nominals, maxima, ...parts] = reportTemplate(rows, SERIALS)
    .trimEnd()
    .split('\r\n')
    .map((line) => line.split(';'))
  const cell = (column: number, part: number) => {
    if (heads![column]!.includes('(pass/fail)')) return 'OK'
    const isLeakage = rows[column - 1]!.characteristic === 'leakage'
    const place = isLeakage && part === SERIALS.length - 1 ? 1.6 : PLACES[part]!
    return reading(minima![column]!, nominals![column]!, maxima![column]!, place)
  }
  const measured = parts.map((fields, part) => fields.map((field, column) => (column === 0 ? field : cell(column, part))))
  return [heads!, ...measured].map((fields) => `${fields.join(';')}\r\n`).join('')
}

/** A reading at `place` from the middle (0) towards a limit (±1), written like the limits. */
function reading(minimum: string, nominal: string, maximum: string, place: number): string {
  const [low, middle, high] = [minimum, nominal, maximum].map((text) => (text === '' ? null : Number(text.replace(',', '.'))))
  const centre = middle ?? (low != null && high != null ? (low + high) / 2 : high != null ? high * 0.85 : (low ?? 1) * 1.1)
  const reach = high != null ? high - centre : centre - (low ?? centre * 0.9)
  return String(Number((centre + place * reach).toPrecision(4)))
}

async function declaration(ctx: Context, vendor: Actor): Promise<SampleReport> {
  const today = (await asActor(ctx, vendor, (tx) => appNow(tx))).toISOString().slice(0, 10)
  return {
    measuredOn: today,
    temperatureC: 22.5,
    humidityPercent: 44,
    instruments: 'Impedance bridge 07, calibrated to the end of the year; milliohmmeter 3; withstand tester 12',
    operator: 'Test room, H. Lindt',
    lotCode: 'TC-2649',
    sampleKind: 'hand-made',
    asBuilt: { kind: 'as-drawing' },
    materials: '',
  }
}

/** A file as an upload would have left it. */
async function staged(ctx: Context, name: string, content: string) {
  const bytes = Buffer.from(content, 'utf8')
  await mkdir(ctx.files.stagingFolder, { recursive: true })
  const place = path.join(ctx.files.stagingFolder, randomUUID())
  await writeFile(place, bytes)
  return { path: place, name, kind: 'csv' as const, sizeBytes: bytes.length, sha256: createHash('sha256').update(bytes).digest('hex') }
}
