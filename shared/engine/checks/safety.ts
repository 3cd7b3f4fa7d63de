import { crossesMains, sideOf } from '../evaluate/boundaries'
import { isVouched } from '../evaluate/library-use'
import { isOnMains, leastRatedMainsV, mainsSupply } from '../evaluate/mains'
import type { MaterialGroup } from '../specification'
import { dutyTraits } from '../topologies'
import { reinforced } from './boundary-input'
import { atLeast, notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

/**
 * On the mains every boundary between the primary's side and another must be double or reinforced; basic insulation does
 * only against protective earth, which a person has to say. Where a sheet asks for protective insulation off the mains,
 * functional insulation between the primary's and another side is none.
 */
function mainsBoundaries({ document, context }: CheckInput): Outcome[] {
  const { insulation } = document.specification
  const mains = isOnMains(document)
  const asked = mains || (document.requirement !== null && document.requirement.insulationMethod !== 'functional')
  if (!asked) return []
  const crossing = insulation.boundaries.flatMap((boundary, index) => {
    if (!crossesMains(context, boundary)) return []
    const toCore = boundary.between.some(({ kind }) => kind === 'core')
    const met = mains ? reinforced({ boundary }) : toCore || boundary.insulation !== 'functional'
    return [yesNo(met, `insulation.boundaries.${index}.insulation`, { boundary: boundary.name, insulation: boundary.insulation })]
  })
  return [...crossing, ...outputSides({ document })]
}

/** A winding counts as of the side on which the sheet has its output: else no boundary would part it from the mains. */
function outputSides({ document: { specification, requirement } }: Pick<CheckInput, 'document'>): Outcome[] {
  const outputs = requirement ? dutyTraits(requirement.duty).outputs : []
  return specification.windings.flatMap(({ name, outputId, side }, index) => {
    const output = outputs.find(({ id }) => id === outputId)
    return output && output.side !== side ? [yesNo(false, `windings.${index}.side`, { winding: name, output: output.name })] : []
  })
}

/** What rounding of the rated voltage to ten volts may take off. */
const ROUNDING_V = 5

function mainsVoltage({ document }: CheckInput): Outcome[] {
  const supply = mainsSupply(document)
  if (!supply) return []
  const path = 'insulation.mainsVoltageV'
  const statedV = document.specification.insulation.mainsVoltageV.value
  if (statedV === null) return [yesNo(false, path, { missing: 'mains voltage' })]
  return [atLeast({ value: statedV, limit: Math.max(supply.nominalV, leastRatedMainsV(supply) - ROUNDING_V), unit: 'V', path })]
}

/** The milder of two surroundings is a statement about the place of use, and needs its reason. */
function surroundings({ document }: CheckInput): Outcome[] {
  const { pollutionDegree, overvoltageCategory } = document.specification.insulation
  const mild = (stated: typeof pollutionDegree | typeof overvoltageCategory, value: unknown) => stated.value === value && !isVouched(stated)
  const category = 'insulation.overvoltageCategory'
  const onMains = !isOnMains(document) ? [] : overvoltageCategory.value === null ? [notCheckable(category)] : [yesNo(!mild(overvoltageCategory, 'I'), category, { category: overvoltageCategory.value })]
  const degree = pollutionDegree.value === null ? notCheckable('insulation.pollutionDegree') : yesNo(!mild(pollutionDegree, 1), 'insulation.pollutionDegree', { degree: pollutionDegree.value })
  return [degree, ...onMains]
}

const GROUPS: readonly MaterialGroup[] = ['I', 'II', 'IIIa', 'IIIb']

/** The group that creepage is dimensioned for is no better than the former's, unless a person names the evidence. */
function materialGroup({ document, context }: CheckInput): Outcome[] {
  const { insulation, former } = document.specification
  const path = 'insulation.materialGroup'
  const group = insulation.materialGroup.value
  if (isVouched(insulation.materialGroup) || group === null || group === 'IIIb') return [yesNo(true, path, { group: group ?? 'IIIb' })]
  const held = isVouched(former.materialGroup) ? former.materialGroup.value : (context.former?.materialGroup ?? null)
  return [held === null ? notCheckable(path, { group }) : yesNo(GROUPS.indexOf(group) >= GROUPS.indexOf(held), path, { group, formerGroup: held })]
}

/** A floating core takes the potentials of its side; one tied to a pin must be tied to that side. */
function coreAssigned({ document: { specification } }: CheckInput): Outcome[] {
  const path = 'core.potential'
  const potential = specification.core.potential.value
  if (!potential) return [yesNo(false, path)]
  const { side, connection, pin } = potential
  const own = specification.windings.filter((winding) => winding.side === side)
  const fitted = new Set([...specification.former.pins.filter(({ state }) => state === 'fitted').map(({ number }) => number), ...specification.former.flyingLeads.map(({ name }) => name)])
  const tied = pin !== null && fitted.has(pin) && own.some(({ startTerminal, finishTerminal }) => startTerminal === pin || finishTerminal === pin)
  return [yesNo(own.length > 0 && (connection === 'floating' || tied), path, { side, ...(pin === null ? {} : { terminal: pin }) })]
}

/** How far pins and stripped ends lie from the core is not held by the library: a person measures it on the part. */
function pinsToCore({ document: { specification }, context }: CheckInput): Outcome[] {
  return specification.insulation.boundaries.flatMap((boundary, index) => {
    if (boundary.insulation === 'functional' || !boundary.between.some(({ kind }) => kind === 'core')) return []
    const other = boundary.between.find(({ kind }) => kind !== 'core')
    return other && sideOf(context, other) !== specification.core.potential.value?.side ? [notCheckable(`insulation.boundaries.${index}`, { boundary: boundary.name })] : []
  })
}

/** Classes that a coil former on the mains may have. Source: UL 94, IEC 60695-11-10. */
const FLAME_CLASS = /\bV-0\b|\b5V[AB]?\b/

function flammability({ document }: CheckInput): Outcome[] {
  const { former, insulation } = document.specification
  const severity = isOnMains(document) ? ('S' as const) : ('M' as const)
  const judge = (text: string | null, path: string, values: Record<string, string>): Outcome => ({ ...((text ?? '').trim() === '' ? notCheckable(path, values) : yesNo(FLAME_CLASS.test(text!), path, { ...values, flammability: text! })), severity })
  return [judge(former.flammability.value, 'former.flammability', {}), ...insulation.polymers.map(({ flammability: text, use }, index) => judge(text, `insulation.polymers.${index}.flammability`, { use }))]
}

export const SAFETY_CHECKS: Readonly<Record<string, Check>> = {
  I14: { severity: 'S', source: 'ferrite is treated as conductive: practice of certification bodies', run: coreAssigned },
  I15: { severity: 'S', source: 'IEC 60664-1:2020; ferrite is treated as conductive', decidedBy: 'person', run: pinsToCore },
  I27: { severity: 'M', source: 'IEC 60695-11-10, UL 94', run: flammability },
  I28: { severity: 'S', source: 'IEC 60664-1:2020, material groups; IEC 60112', run: materialGroup },
  I31: { severity: 'S', source: 'IEC 62368-1, 5.3; IEC 61558-2-16: accessible output against mains', run: mainsBoundaries },
  I32: { severity: 'S', source: 'rated voltage of the supply: IEC 60664-1:2020, Table F.1', run: mainsVoltage },
  I33: { severity: 'S', source: 'IEC 60664-1:2020, overvoltage categories and pollution degrees', run: surroundings },
}
