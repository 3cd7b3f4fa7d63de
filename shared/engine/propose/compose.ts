import { systemMembers } from '../evaluate/thermal-members'
import { createContext } from '../evaluate/context'
import { gapForInductance } from '../magnetics/gap'
import { gappedCore } from '../evaluate/inductance'
import { referenceTo } from '../evaluate/lookup'
import type { LibraryIndex } from '../evaluate/lookup'
import { clean, toDigits } from '../digits'
import type { Library, TapeRow } from '../library'
import { dutyTraits } from '../topologies'
import type { Duty, MainsSupply, RequirementSheet, SpecificationDocument, Winding, WindingSpecification } from '../specification'
import { blankSpecification } from './blank'
import { planBoundaries } from './boundaries'
import type { Design } from './design'
import { planNotes } from './notes'
import { planPins } from './pins'
import type { PinPlan } from './pins'
import type { ProposalPreferences } from './preferences'
import { planSequence } from './sequence'
import { fromLibrary, PROPOSED, proposed, toStepUp } from './stated'

export interface ComposeInput {
  requirement: RequirementSheet
  design: Design
  library: Library
  index: LibraryIndex
  preferences: ProposalPreferences
  tape: TapeRow
  marginTape: TapeRow | null
}

export interface Composed {
  document: SpecificationDocument
  pins: PinPlan
}

/** A design written out as a document; figures that need an evaluation are filled by `derive` afterwards. */
export function compose(input: ComposeInput): Composed {
  const { requirement, design, index, library } = input
  const split = design.interleaved ? (design.windings.find(({ role }) => role === 'primary')?.id ?? null) : null
  const pins = planPins(design.former, design.windings, { split, protective: design.protective })
  const specification: WindingSpecification = {
    ...blankSpecification(),
    windings: design.windings.map((planned) => windingOf(planned, pins)),
    sequence: planSequence({ design, pins: pins.of, index, tape: input.tape, marginTape: input.marginTape }),
  }
  fillTitle(specification, requirement)
  fillElectrical(specification, requirement)
  fillCore(specification, design)
  fillFormer(specification, design, pins)
  fillInsulation(specification, input)
  const document = { specification, requirement }
  fillInductance(document, input)
  specification.insulation.systemThermalClassC = proposed(Math.min(...systemMembers(createContext(document, library, false)).map(({ classC }) => classC)))
  specification.notes = planNotes(specification, design)
  return { document, pins }
}

function windingOf({ id, name, role, side, outputId, turns, wire }: Design['windings'][number], pins: PinPlan): Winding {
  const { start, finish } = pins.of.get(id)!
  return { id, status: 'mandatory', origin: PROPOSED, name, role, side, outputId, startTerminal: start, finishTerminal: finish, turns, wire, rmsCurrentA: null, peakCurrentA: null, dcCurrentA: null, dcResistance: null }
}

/** Titles as ISO 7200 asks: the kind of part, then what it is for. */
const TITLES: Readonly<Record<Duty['topology'], string>> = {
  'flyback': 'Transformer, flyback',
  'coupled-inductor': 'Inductor, coupled',
  'forward': 'Transformer, forward',
  'half-bridge': 'Transformer, half-bridge',
  'full-bridge': 'Transformer, full-bridge',
  'push-pull': 'Transformer, push-pull',
  'llc': 'Transformer, resonant half-bridge',
  'inductor': 'Inductor',
  'common-mode-choke': 'Choke, common-mode',
  'gate-drive': 'Transformer, gate-drive',
  'current-sense': 'Transformer, current-sense',
}

function fillTitle({ title }: WindingSpecification, { duty }: RequirementSheet): void {
  const { inputPowerW, efficiency, frequencyHz } = dutyTraits(duty)
  title.title = proposed(TITLES[duty.topology])
  const powerW = (inputPowerW ?? 0) * (efficiency ?? 1)
  const power = powerW > 0 ? `${toDigits(powerW, 2)} W, ` : ''
  title.supplementaryTitle = proposed(`${power}${toDigits(frequencyHz.minimum / 1000, 3)} kHz`, 'reference')
}

/** What the drawing takes over from the duty. */
export function fillElectrical({ electrical }: WindingSpecification, { duty }: RequirementSheet): void {
  electrical.topology = proposed(duty.topology, 'reference')
  electrical.switchingFrequencyHz = proposed({ ...dutyTraits(duty).frequencyHz }, 'reference')
}

function fillCore({ core }: WindingSpecification, design: Design): void {
  core.core = fromLibrary(referenceTo(design.core), referenceTo(design.core))
  core.material = fromLibrary(referenceTo(design.material), referenceTo(design.material))
  core.potential = proposed({ connection: 'floating', pin: null, side: 'primary' })
}

function fillFormer({ former }: WindingSpecification, design: Design, pins: PinPlan): void {
  const row = design.former
  const reference = referenceTo(row)
  former.former = fromLibrary(reference, reference)
  former.material = fromLibrary(row.material, reference)
  former.plastic = fromLibrary(row.plastic, reference)
  former.flammability = fromLibrary(row.flammability, reference)
  former.materialGroup = fromLibrary(row.materialGroup, reference)
  former.mounting = fromLibrary(row.mounting, reference)
  former.pins = pins.pins
  former.pinPitchMm = fromLibrary(row.pinPitchMm, reference)
  former.rowSpacingMm = fromLibrary(row.pinRowSpacingMm, reference)
  former.pinSection = fromLibrary({ ...row.pinSection }, reference)
  former.pinLengthMm = fromLibrary(row.pinLengthMm, reference)
  former.standoffMm = fromLibrary(row.standoffMm, reference)
  former.recommendedHoleMm = proposed(toStepUp(row.pinSection.sizeMm * (row.pinSection.shape === 'square' ? Math.SQRT2 : 1) + 0.25, 0.1), 'reference')
  const { length, width, height } = row.envelopeMm
  // Tape, adhesive, label and solder stand over core and former.
  former.envelope = proposed({ lengthMm: toStepUp(length + 1, 0.5), widthMm: toStepUp(width + 1, 0.5), heightMm: toStepUp(height + 0.5, 0.5) })
}

function fillInsulation({ insulation }: WindingSpecification, { design, requirement, preferences }: ComposeInput): void {
  const { duty } = requirement
  insulation.productStandard = proposed(preferences.productStandard)
  insulation.standardEdition = proposed(preferences.standardEdition)
  fillSurroundings(insulation, preferences)
  const { supply } = dutyTraits(duty)
  if (supply?.kind === 'mains') insulation.mainsVoltageV = proposed(ratedMainsV(supply))
  insulation.materialGroup = fromLibrary(design.former.materialGroup, referenceTo(design.former))
  insulation.maximumAmbientC = proposed(requirement.ambientC)
  insulation.boundaries = planBoundaries(design)
  insulation.polymers = [{ id: 'y1', status: 'mandatory', origin: PROPOSED, use: 'Coil former', material: design.former.material, flammability: design.former.flammability, fileNumber: '' }]
}

/** The greatest mains voltage is given with its tolerance, commonly 10 %; a single voltage without one is rated itself. */
const ratedMainsV = ({ nominalV, maximumV }: MainsSupply) => Math.max(nominalV, Math.round(maximumV / 11) * 10)

function fillSurroundings(insulation: WindingSpecification['insulation'], { surroundings }: ProposalPreferences): void {
  if (!surroundings) return
  const entered = <T>(value: T) => ({ value, status: 'mandatory' as const, origin: { kind: 'entered' as const } })
  insulation.overvoltageCategory = entered(surroundings.overvoltageCategory)
  insulation.pollutionDegree = entered(surroundings.pollutionDegree)
  insulation.altitudeM = entered(surroundings.altitudeM)
}

/** How far a specified inductance may lie from the calculated one to do with two digits. */
const TWO_DIGITS_SHARE = 0.004

/** A figure that a person would specify: two digits where they come near, else three. */
function roundInductance(inductanceH: number): number {
  const short = toDigits(inductanceH, 2)
  return Math.abs(short / inductanceH - 1) <= TWO_DIGITS_SHARE ? short : toDigits(inductanceH, 3)
}

/** Spread of a core's A_L without gap, and what winding and reading add below it. Source: IEC 62358 practice, ±25 %. */
const UNGAPPED_SPREAD = 0.25
const UNGAPPED_EXTRA = 0.05

/** Without a gap the inductance has a lower limit only, and nothing controls it but core and turns. */
function fillUngapped({ core, electrical }: WindingSpecification, design: Design, primary: Design['windings'][number]): void {
  const nominalH = roundInductance(design.inductanceH)
  const spread = Math.max(UNGAPPED_SPREAD, design.material.permeabilityTolerance)
  core.gap = { ...core.gap, control: proposed('none'), alH: proposed(toDigits(nominalH / primary.turns ** 2, 3), 'reference'), alTolerance: proposed(spread, 'reference'), position: proposed('none') }
  electrical.inductance = proposed({ windingId: primary.id, nominalH, lowerTolerance: -clean(spread + UNGAPPED_EXTRA), upperTolerance: null, frequencyHz: nominalH >= 1e-3 ? 10e3 : 100e3, levelV: 0.25, temperatureC: 25, model: 'series' })
}

/** The inductance to two or three digits; A_L to three, which controls; the gap is for reference. */
function fillInductance(document: SpecificationDocument, { design, library, preferences }: ComposeInput): void {
  const { core, electrical } = document.specification
  const primary = design.windings.find(({ role }) => role === 'primary')!
  if (design.ungapped) return fillUngapped(document.specification, design, primary)
  const nominalH = roundInductance(design.inductanceH)
  const alH = toDigits(nominalH / primary.turns ** 2, 3)
  const gapped = gappedCore(createContext(document, library, false))
  const solution = gapped ? gapForInductance(gapped, nominalH, primary.turns) : null
  const gapMm = solution?.state === 'found' ? solution.gapMm : null
  // The tolerance of grinding weighs more the shorter the gap is.
  const small = gapMm !== null && gapMm < 0.1
  const alTolerance = small ? Math.max(0.1, preferences.alTolerance) : preferences.alTolerance
  const tolerance = clean(Math.max(preferences.inductanceTolerance, alTolerance + (small ? 0.05 : 0.01)))
  core.gap = { ...core.gap, control: proposed('al'), alH: proposed(alH), alTolerance: proposed(alTolerance), lengthMm: proposed(gapMm === null ? null : toDigits(gapMm, 2), 'reference'), position: proposed('centre-leg') }
  electrical.inductance = proposed({
    windingId: primary.id,
    nominalH,
    lowerTolerance: -tolerance,
    upperTolerance: tolerance,
    frequencyHz: nominalH >= 1e-3 ? 10e3 : 100e3,
    levelV: 0.25,
    temperatureC: 25,
    model: 'series',
  })
}
