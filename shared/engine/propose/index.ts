import { evaluate } from '../evaluate'
import { indexLibrary } from '../evaluate/lookup'
import type { Finding } from '../findings'
import type { Library } from '../library'
import { proposeTests } from '../limits'
import type { RequirementSheet, SpecificationDocument } from '../specification'
import { blankSpecification } from './blank'
import { fillElectrical } from './compose'
import { derive } from './derive'
import { chooseMaterial } from './material'
import { planOf } from './plan'
import { ratioFindings } from './plan-flyback'
import { brokenChecks } from './judge'
import { DEFAULT_PREFERENCES } from './preferences'
import type { ProposalPreferences } from './preferences'
import type { ProposalReason } from './reasons'
import { searchCore } from './search'
import type { Candidate, SearchResult } from './search'
import { isProposed } from './stated'

export { blankSpecification } from './blank'
export { DEFAULT_PREFERENCES } from './preferences'
export type { ProposalPreferences } from './preferences'
export type { ProposalReason, ReasonCode } from './reasons'

export interface Proposal {
  document: SpecificationDocument
  /** What the engineer should look at before believing it. */
  findings: Finding[]
  reasons: ProposalReason[]
}

/**
 * A whole winding specification from a requirement sheet: ratio, inductance, material, core, turns, gap, wires, pins, sequence,
 * insulation boundaries, notes, defaults and test table. Every field says that it was proposed.
 *
 * A sheet that cannot be solved gives a blank specification with findings that say why.
 */
export function propose(requirement: RequirementSheet, library: Library, preferences: Partial<ProposalPreferences> = {}): Proposal {
  const wishes = { ...DEFAULT_PREFERENCES, ...preferences }
  return withoutSolution(requirement, () => proposed(requirement, library, wishes))
}

/** A sheet whose figures contradict each other is no misuse: the stage's refusal becomes a finding. */
function withoutSolution(requirement: RequirementSheet, work: () => Proposal): Proposal {
  try {
    return work()
  } catch (error) {
    if (!(error instanceof RangeError)) throw error
    return blankProposal(requirement, [{ code: 'duty-not-solvable', severity: 'error', path: 'requirement.duty', values: { reason: error.message } }])
  }
}

function proposed(requirement: RequirementSheet, library: Library, wishes: ProposalPreferences): Proposal {
  const plan = planOf(requirement)
  if (!plan) return unplannedProposal(requirement)
  const choice = chooseMaterial(library, plan.frequencyHz, wishes.materialId, plan.materialUse)
  const findings = [...plan.findings, ...protectionFindings(requirement, plan.onMains), ...choice.findings]
  if (!choice.material || library.tapes.length === 0) return blankProposal(requirement, findings)

  const result = searchCore({ requirement, plan, material: choice.material, library, index: indexLibrary(library), preferences: wishes })
  if (!result.chosen) {
    const finding: Finding = { code: 'no-core-fits', severity: 'error', path: 'core.core', values: { tried: result.rejected.length, reason: result.rejected[result.rejected.length - 1]?.rejection ?? 'height' } }
    return { ...blankProposal(requirement, [...findings, finding]), reasons: [...plan.reasons, ...choice.reasons, ...rejectionReasons(result)] }
  }
  const document = completed(result.chosen.document, library)
  return {
    document,
    findings: [...findings, ...choiceFindings(requirement, result), ...evaluate(document, library).findings],
    reasons: [...plan.reasons, ...choice.reasons, ...choiceReasons(result.chosen, result)],
  }
}

/** Functional insulation protects nobody: on the mains it suits only a part whose outputs nobody can touch. */
const protectionFindings = ({ insulationMethod }: RequirementSheet, onMains: boolean): Finding[] =>
  onMains && insulationMethod === 'functional' ? [{ code: 'mains-without-protection', severity: 'error', path: 'requirement.insulationMethod', values: {} }] : []

const blankProposal = (requirement: RequirementSheet, findings: Finding[]): Proposal => ({ document: { specification: blankSpecification(), requirement }, findings, reasons: [] })

/** The requirement is kept, and what it says of the drawing, so that a person can enter the part. */
function unplannedProposal(requirement: RequirementSheet): Proposal {
  const proposal = blankProposal(requirement, [{ code: 'duty-without-proposal', severity: 'warning', path: 'requirement.duty', values: { topology: requirement.duty.topology } }])
  fillElectrical(proposal.document.specification, requirement)
  return proposal
}

/** Twice: the second time distances and certificates follow from the voltages as they now stand, rounded up, in the document. */
const completed = (document: SpecificationDocument, library: Library): SpecificationDocument => {
  const once = derive(document, evaluate(document, library))
  return derive(once, evaluate(once, library))
}

function choiceFindings({ duty }: RequirementSheet, { chosen, rejected }: SearchResult): Finding[] {
  const notFitting: Finding[] = chosen?.rejection ? [{ code: 'no-core-fits', severity: 'error', path: 'core.core', values: { tried: rejected.length, reason: chosen.rejection } }] : []
  if (!chosen) return notFitting
  const ofWindings = [...notFitting, ...wireFindings(chosen), ...pinFindings(chosen)]
  if (duty.topology !== 'flyback') return ofWindings
  const turnsOf = (outputId: string) => chosen.design.windings.find((winding) => winding.outputId === outputId)?.turns ?? 1
  return [...ofWindings, ...ratioFindings(duty, turnsOf)]
}

/** Windings for which the library holds no wire that suits. */
const wireFindings = ({ design }: Candidate): Finding[] =>
  design.windings.flatMap(({ name, wire, makeshift }, index) => (makeshift ? [{ code: 'no-suitable-wire', severity: 'warning', path: `windings.${index}.wire`, values: { winding: name, parallel: wire.parallel, wire: wire.wire.id } }] : []))

/** Wires that one pin takes. Source: common practice, two or three. */
const WIRES_PER_PIN = 3

/** Ends that would better be shared between two pins: too much current, or too many wires. */
function pinFindings({ design, evaluation }: Candidate): Finding[] {
  const overloaded = brokenChecks(evaluation, 'P03').map(({ path, value, limit, values }): Finding => ({ code: 'too-few-pins', severity: 'warning', path, values: { winding: values.winding ?? '', currentA: value ?? 0, limitA: limit ?? 0 } }))
  const crowded = design.windings.flatMap(({ name, wire }, index): Finding[] => {
    const path = `windings.${index}.startTerminal`
    if (wire.parallel <= WIRES_PER_PIN || overloaded.some((finding) => finding.path === path)) return []
    return [{ code: 'too-few-pins', severity: 'note', path, values: { winding: name, wires: wire.parallel, usual: WIRES_PER_PIN } }]
  })
  return [...overloaded, ...crowded]
}

/** The cores nearest to the chosen one that fell out. */
const rejectionReasons = ({ rejected }: Pick<SearchResult, 'rejected'>): ProposalReason[] =>
  rejected.slice(-8).map(({ core, rejection }) => ({ code: 'core-rejected', path: 'core.core', values: { core, reason: rejection } }))

function choiceReasons({ design, evaluation }: Candidate, { rejected }: SearchResult): ProposalReason[] {
  return [
    { code: 'smallest-core-that-fits', path: 'core.core', values: { core: design.core.name, former: design.former.name, tried: rejected.length + 1 } },
    ...rejectionReasons({ rejected }),
    { code: 'turns-from-flux', path: 'windings.0.turns', values: { turns: design.windings[0]!.turns, fluxWorstT: evaluation.magnetics.fluxWorstT ?? 0, saturationT: evaluation.magnetics.saturationT ?? 0 } },
    ...design.windings.map(({ name, wire }, index): ProposalReason => ({ code: 'wire-from-density-and-skin-depth', path: `windings.${index}.wire`, values: { winding: name, parallel: wire.parallel, wire: wire.wire.id, currentDensityAPerMm2: evaluation.windings[index]?.currentDensityAPerMm2 ?? 0 } })),
    ...(design.interleaved ? [{ code: 'primary-in-two-halves' as const, path: 'sequence', values: {} }] : []),
    ...(design.method === 'margin-tape' ? [{ code: 'margins-from-creepage' as const, path: 'sequence', values: { marginMm: design.marginMm } }] : []),
    ...(design.method === 'triple-insulated-wire' ? [{ code: 'insulated-wire' as const, path: 'windings', values: {} }] : []),
  ]
}

/**
 * The document with every proposed figure brought up to date after an edit: A_L and gap, currents, limits, boundaries' values and
 * proposed test rows. What a person entered stays.
 */
export function refresh(document: SpecificationDocument, library: Library): SpecificationDocument {
  const { specification } = document
  // The boundaries' own voltages would only ever rise if the old ones were taken as stated.
  const boundaries = specification.insulation.boundaries.map((boundary) => (isProposed(boundary) ? { ...boundary, workingVoltageVRms: null, recurringPeakV: null } : boundary))
  const plain: SpecificationDocument = { ...document, specification: { ...specification, insulation: { ...specification.insulation, boundaries } } }
  return completed(plain, library)
}

/** The test table brought up to date with the document's limits; rows that a person entered stay as they are. */
export function reproposeTests(document: SpecificationDocument): SpecificationDocument {
  const { specification } = document
  return { ...document, specification: { ...specification, tests: proposeTests(document, specification.tests) } }
}
