import { layOutCoil, layOutRing, nearestFit } from '../build'
import type { Coil, NearestFit } from '../build'
import { runChecks } from '../checks'
import type { Evaluation, Layout, MassResult } from '../evaluation'
import type { Finding } from '../findings'
import type { Library } from '../library'
import type { LibraryReference, SpecificationDocument, Winding } from '../specification'
import { ENGINE_VERSION } from '../version'
import { boundaryResults } from './boundaries'
import { capacitanceResults } from './capacitances'
import { coreHeat, reportCoreLoss } from './core-loss'
import { createContext, report } from './context'
import type { Context } from './context'
import { shieldMassG, windingCoppers } from './copper'
import type { WindingCopper } from './copper'
import { copperStage } from './copper-loss'
import type { CornerState } from './corner-result'
import { cornerAt, cornersOf } from './corners'
import { reportContradictions } from './document-findings'
import { explainCorners } from './explain-corners'
import { explainResults } from './explain-results'
import { faultCases } from './fault-cases'
import { finiteOnly } from './finite'
import { gapOf, inductanceBasis } from './inductance'
import type { InductanceBasis } from './inductance'
import { leakages } from './leakage'
import { reportLibrary } from './library-findings'
import { buildWire, thinnerWires } from './lookup'
import { magneticsResult } from './magnetics'
import { mainsSupply, ratedMainsV } from './mains'
import { heatBalance } from './thermal'
import { voltageCorner } from './working-voltage'
import type { VoltageCorners } from './working-voltage'
import { windingResults } from './windings'

export interface EvaluateOptions {
  /** Collect how each figure came about; costs time. */
  working?: boolean
}

/**
 * Everything that the engine knows about one specification: waveforms at its corners, flux, build, losses, temperature,
 * leakage, insulation, findings and release checks. Lengths in mm, temperatures in °C, everything else SI; no rounding.
 *
 * A doubtful, contradictory or unfinished document is answered with findings; what cannot be told is null.
 */
export function evaluate(document: SpecificationDocument, library: Library, options: EvaluateOptions = {}): Evaluation {
  const context = createContext(document, library, options.working ?? false)
  reportLibrary(context)
  reportContradictions(context)
  reportPrimary(context)

  const coil = layOut(context)
  const basis = inductanceBasis(context)
  const corners = dutyCorners(context, basis, coil)
  const coppers = windingCoppers(context, coil)
  const copper = copperStage(context, coil, { coppers, gapMm: gapOf({ ...context, findings: [], working: null }, basis).gapMm })
  const heat = heatBalance(context, { copper, corners })
  const hotC = heat.temperatureC
  reportCoreLoss(context, heat.hottest ? coreHeat({ ...context, findings: [] }, heat.hottest, hotC ?? 100) : null)
  const body: Omit<Evaluation, 'checks'> = {
    engine: ENGINE_VERSION,
    corners: corners.map(({ result }) => result),
    magnetics: magneticsResult(context, { coil, basis, corners, temperatureC: hotC }),
    windings: windingResults(context, { copper, coil, corners, loss: heat.copper, flat: heat.flat, hotC }),
    leakages: leakages(context, coil),
    ...capacitanceResults(context, coil, basis),
    layout: coil?.layout ?? EMPTY_LAYOUT,
    losses: heat.losses,
    lossesByCorner: heat.lossesByCorner,
    thermal: heat.thermal,
    faults: faultCases(context, { basis, coil, corners, settle: heat.settleAt }),
    boundaries: boundaryResults(context, coil, voltageCorners(context, { basis, coil, corners })),
    mass: massOf(context, coil, coppers),
    findings: [],
    working: {},
  }
  explainCorners(context, body.corners)
  explainResults(context, body)
  const checks = runChecks({ document, evaluation: body, coil, context, loopGain: heat.loopGain })
  return finiteOnly({ ...body, findings: distinct(context.findings), working: context.working ?? {}, checks })
}

const EMPTY_LAYOUT: Layout = { windowWidthMm: 0, windowHeightMm: 0, items: [], buildMm: 0, buildRatio: 0, copperFill: 0, windowFill: 0 }

function reportPrimary(context: Context): void {
  const primaries = context.specification.windings.filter(({ role }) => role === 'primary')
  if (!context.primary) report(context, 'no-primary-winding', 'error', 'windings')
  // A push-pull converter's primary has two halves.
  const halves = context.requirement?.duty.topology === 'push-pull' ? 2 : 1
  if (primaries.length > halves) report(context, 'several-primary-windings', 'warning', 'windings', { windings: primaries.map(({ name }) => name).join(', ') })
}

function layOut(context: Context): Coil | null {
  const { core, former, specification, index } = context
  const shared = {
    windings: specification.windings,
    sequence: specification.sequence,
    wireOf: (winding: Winding) => buildWire(index, winding),
    tapeOf: (reference: LibraryReference) => index.find('tape', reference),
    sleeveOf: (reference: LibraryReference) => index.find('sleeve', reference),
  }
  const coil = former ? layOutCoil({ ...shared, former }) : core?.shape === 'toroid' ? layOutRing({ ...shared, core }) : null
  if (!coil) return null
  const overfilled = former ? coil.findings.findIndex(({ code }) => code === 'window-overfilled') : -1
  if (former && overfilled >= 0) coil.findings[overfilled] = withNearestFit(context, coil.findings[overfilled]!, nearestFit({ ...shared, former, thinnerWires: (winding) => thinnerWires(index, winding) }, coil))
  context.findings.push(...coil.findings)
  return coil
}

function withNearestFit({ specification }: Context, overfilled: Finding, fit: NearestFit | null): Finding {
  if (!fit) return overfilled
  const winding = specification.windings.find(({ id }) => id === fit.windingId)?.name
  const { change, index, from, to, buildMm } = fit
  return { ...overfilled, values: { ...overfilled.values, change, changeStep: index + 1, ...(winding === undefined ? {} : { winding }), from, to, changedBuildMm: buildMm } }
}

function dutyCorners(context: Context, basis: InductanceBasis | null, coil: Coil | null): CornerState[] {
  if (!context.requirement && basis) report(context, 'currents-from-stated-values', 'note', 'windings')
  return basis ? cornersOf(context, basis, coil) : []
}

/** The rms working voltage belongs to the rated mains voltage; the recurring peak to the greatest input. */
function voltageCorners(context: Context, { basis, coil, corners }: { basis: InductanceBasis | null; coil: Coil | null; corners: readonly CornerState[] }): VoltageCorners {
  const peak = corners.map(voltageCorner)
  const ratedV = ratedMainsV(context)
  if (!mainsSupply(context) || ratedV === null || !basis) return { peak, rms: peak, onMains: false }
  const rated = cornerAt(context, { inductanceH: basis.nominalH, coil, inputV: ratedV * Math.SQRT2 })
  return { peak, rms: rated ? [voltageCorner(rated)] : peak, onMains: true }
}

/** Copper of windings and shields; null while one of them is not laid. */
function massOf({ core, sets, specification }: Context, coil: Coil | null, coppers: readonly WindingCopper[]): MassResult {
  const massesG = specification.windings.map(({ id }) => coppers.find(({ winding }) => winding.id === id)?.massG ?? shieldMassG(specification, coil, id))
  const copperG = massesG.length > 0 && massesG.every((massG) => massG !== null) ? massesG.reduce((sum, massG) => sum + massG, 0) : null
  const coreG = core?.massG != null ? core.massG * sets : null
  return { copperG, coreG, totalG: copperG !== null && coreG !== null ? copperG + coreG : null }
}

/** The same doubt about the same place is said once. */
function distinct(findings: readonly Finding[]): Finding[] {
  const seen = new Set<string>()
  return findings.filter((finding) => {
    const key = `${finding.code} ${finding.path} ${JSON.stringify(finding.values)}`
    if (seen.has(key)) return false
    seen.add(key)
    return true
  })
}
