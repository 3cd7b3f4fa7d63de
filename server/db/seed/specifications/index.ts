import type { Context } from '#server/context'
import { asActor, type Actor } from '#server/db/as-actor'
import { specifications } from '#server/db/schema/index'
import { currentLibrary } from '#server/services/parts/library-for'
import { overrideCheck, returnDraft, submitDraft } from '#server/services/specifications/check-draft'
import { readSpecification } from '#server/services/specifications/list-specifications'
import { readRevision } from '#server/services/specifications/read-revision'
import { releaseRevision } from '#server/services/specifications/release-revision'
import { openChecks } from '#server/services/specifications/seal-release'
import { createNextDraft, createSpecification, saveDraft, type DraftKey } from '#server/services/specifications/write-draft'
import { placeOfCheck, type Revision } from '#shared/contracts/specifications'
import { evaluate, propose } from '#shared/engine/index'
import type { RequirementSheet, SpecificationDocument, Stated } from '#shared/engine/specification'
import { and, eq } from 'drizzle-orm'
import { demoActor } from '../people'
import { BUOY_SUPPLY, COUPLED_INDUCTOR, HARBOUR_SUPPLY } from './requirements'

/** The part numbers that the demo's enquiries ask for. */
export const DEMO_PARTS = { buoy: 'BM-T1180', harbour: 'BM-T1204', coupledInductor: 'BM-L0311', saltern: 'SI-40772' } as const

/** Why a second person let a check pass that the demo's data cannot decide. */
const REASONS: Readonly<Record<string, string>> = {
  I06: 'Creepage above 30 kHz looked up by hand in the copy of IEC 60664-4 in force; the 60664-1 distance governs here.',
  I15: 'Distance of the secondary’s pins and stripped ends to the core measured on a sample; it exceeds the creepage asked for.',
  L01: 'Compared with the part on the bench; its figures hold.',
  P21: 'The board’s footprint laid beside the pin-out: both are seen from the side that the drawing names.',
}

interface DemoPart {
  partNumber: string
  title: string
  owner: string
  requirement: RequirementSheet
}

const part = (partNumber: string, title: string, requirement: RequirementSheet, owner = 'Brightmoor Power Works'): DemoPart => ({ partNumber, title, owner, requirement })

/**
 * Four released parts; of the buoy's a new draft waits for its checker, of the coupled inductor's one came back
 * to its author. Each part goes on from where an interrupted start left it.
 */
export async function seedSpecifications(ctx: Context): Promise<void> {
  const edda = await demoActor(ctx, 'edda.lowe@brightmoor.example')
  const tomas = await demoActor(ctx, 'tomas.arkell@brightmoor.example')
  const buoy = await ensureReleased(ctx, edda, tomas, part(DEMO_PARTS.buoy, 'Transformer, flyback, buoy supply', BUOY_SUPPLY))
  await ensureReleased(ctx, edda, tomas, part(DEMO_PARTS.harbour, 'Transformer, flyback, harbour supply', HARBOUR_SUPPLY))
  const inductor = await ensureReleased(ctx, edda, tomas, part(DEMO_PARTS.coupledInductor, 'Inductor, coupled 1:1', COUPLED_INDUCTOR))

  const packed = await ensureNextDraft(ctx, edda, buoy, (document) => enter(document.specification.packing.piecesPerPack, 60))
  if (packed.state === 'draft') await submit(ctx, edda, packed)

  const dipped = await ensureNextDraft(ctx, edda, inductor, (document) => enter(document.specification.impregnation.process, 'dip'))
  if (dipped.returnedReason === null) {
    const inCheck = dipped.state === 'draft' ? await submit(ctx, edda, dipped) : dipped
    await asActor(ctx, tomas, (tx) => returnDraft(tx, tomas, keyOf(inCheck), 'Name the varnish, its class and its bake; then it can go.'))
  }

  const bas = await demoActor(ctx, 'bas.kuiper@saltern.example')
  const wim = await demoActor(ctx, 'wim.haas@saltern.example')
  await ensureReleased(ctx, bas, wim, part(DEMO_PARTS.saltern, 'Inductor, coupled 1:1, probe supply', COUPLED_INDUCTOR, 'Saltern Instruments'))
}

const keyOf = ({ specificationId, id }: Pick<Revision, 'specificationId' | 'id'>): DraftKey => ({ specificationId, revisionId: id })

function enter<T>(field: Stated<T>, value: T): void {
  Object.assign(field, { value, origin: { kind: 'entered' } })
}

const submit = (ctx: Context, engineer: Actor, draft: Revision): Promise<Revision> =>
  asActor(ctx, engineer, (tx) => submitDraft(tx, engineer, keyOf(draft), draft.version))

/** The first revision of the part, released: from the beginning or from where it stands. */
async function ensureReleased(ctx: Context, engineer: Actor, checker: Actor, wanted: DemoPart): Promise<Revision> {
  const first = (await findFirst(ctx, engineer, wanted.partNumber)) ?? (await create(ctx, engineer, wanted))
  if (first.release) return first
  const inCheck = first.state === 'draft' ? await submit(ctx, engineer, first) : first
  const library = await asActor(ctx, engineer, (tx) => currentLibrary(tx, engineer))
  const passed = new Set(inCheck.overrides.map(placeOfCheck))
  const open = new Map(openChecks(evaluate(inCheck.document, library), passed).map((check) => [placeOfCheck(check), check]))
  for (const { code, path } of open.values()) {
    await asActor(ctx, checker, (tx) => overrideCheck(tx, checker, keyOf(inCheck), { code, path, reason: reasonFor(code) }))
  }
  return releaseRevision(ctx, checker, keyOf(inCheck), inCheck.version)
}

function reasonFor(code: string): string {
  const reason = REASONS[code]
  if (!reason) throw new Error(`The demo's parts are stopped by ${code}, for which nobody has a reason.`)
  return reason
}

function findFirst(ctx: Context, engineer: Actor, partNumber: string): Promise<Revision | null> {
  return asActor(ctx, engineer, async (tx) => {
    const [found] = await tx.select({ id: specifications.id }).from(specifications).where(and(eq(specifications.companyId, engineer.companyId), eq(specifications.partNumber, partNumber)))
    if (!found) return null
    const { revisions } = await readSpecification(tx, engineer, found.id)
    return readRevision(tx, engineer, found.id, revisions.at(-1)!.id)
  })
}

async function create(ctx: Context, engineer: Actor, { requirement, ...wanted }: DemoPart): Promise<Revision> {
  const library = await asActor(ctx, engineer, (tx) => currentLibrary(tx, engineer))
  const { document } = propose(requirement, library)
  nameIt(document, wanted)
  complete(document)
  return asActor(ctx, engineer, (tx) => createSpecification(tx, engineer, { partNumber: wanted.partNumber, title: wanted.title, document }))
}

function nameIt(document: SpecificationDocument, { partNumber, title: name, owner }: Omit<DemoPart, 'requirement'>): void {
  const { title } = document.specification
  enter(title.legalOwner, owner)
  enter(title.partNumber, partNumber)
  enter(title.title, name)
  enter(title.responsibleDepartment, 'Magnetics')
  enter(title.technicalReference, 'Power design office')
}

/** What an engineer reads off the former's drawing and knows of the place of use, and no requirement sheet says. */
function complete({ specification: { former, compliance, insulation } }: SpecificationDocument): void {
  enter(former.leadSlotWidthMm, 3.5)
  enter(compliance.reachListDate, '2025-06-25')
  if (insulation.mainsVoltageV.value !== null) enter(insulation.impulse, { voltageV: 4000, shots: 5, polarity: 'both', where: 'Primary pins joined against secondary pins joined' })
}

async function ensureNextDraft(ctx: Context, engineer: Actor, released: Revision, change: (document: SpecificationDocument) => void): Promise<Revision> {
  return asActor(ctx, engineer, async (tx) => {
    const { revisions } = await readSpecification(tx, engineer, released.specificationId)
    const open = revisions.find(({ state }) => state === 'draft' || state === 'in-check')
    if (open) return readRevision(tx, engineer, released.specificationId, open.id)
    const draft = await createNextDraft(tx, engineer, released.specificationId)
    change(draft.document)
    return saveDraft(tx, engineer, keyOf(draft), draft.version, draft.document)
  })
}
