import { isInsulatedWire, windingsAt } from '../evaluate/insulation-paths'
import { recurringPeakClearanceMm } from '../insulation/coordination'
import type { Pin, Winding } from '../specification'
import { protective } from './boundary-input'
import { wired } from './build-fit'
import { atLeast, atMost, notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

const pinNumbers = ({ document }: CheckInput) => new Set(document.specification.former.pins.map(({ number }) => number))

/** Windings with an end on a pin; flying leads carry theirs away. */
const onPins = (input: CheckInput) => {
  const pins = pinNumbers(input)
  return wired(input).filter(({ winding }) => pins.has(winding.startTerminal) || pins.has(winding.finishTerminal))
}

const pinSizeMm = ({ document, context }: CheckInput): number | null => document.specification.former.pinSection.value?.sizeMm ?? context.former?.pinSection.sizeMm ?? null

/** Wires that one pin takes. Source: common practice. */
const WIRES_PER_PIN = 3

/** Turns that a wire is wrapped round its pin. Source: common practice. */
const WRAP_TURNS = 2

/** Every wire that ends at a pin, and the height of its wraps, for which the standoff keeps the body off the board. */
function wiresPerPin(input: CheckInput): Outcome[] {
  const { former } = input.document.specification
  const wrapped = former.pins.flatMap(({ number, state }, index) => {
    const ends = state === 'fitted' ? endsAt(input, number) : []
    if (ends.length === 0) return []
    const wires = ends.reduce((sum, { winding }) => sum + winding.wire.parallel, 0)
    const heightMm = ends.reduce((sum, { winding, row }) => sum + WRAP_TURNS * winding.wire.parallel * row.conductorMm * (row.form === 'litz' ? Math.sqrt(row.strands) : 1), 0)
    return [{ wires, heightMm, path: `former.pins.${index}`, values: { terminal: number } }]
  })
  const highest = wrapped.reduce<(typeof wrapped)[0] | null>((most, one) => (most && most.heightMm >= one.heightMm ? most : one), null)
  return [
    ...wrapped.map(({ wires, path, values }) => atMost({ value: wires, limit: WIRES_PER_PIN, unit: '', path, values })),
    ...(highest ? [{ ...atMost({ value: highest.heightMm, limit: former.standoffMm.value, unit: 'mm', path: 'former.standoffMm', values: highest.values }), severity: 'N' as const }] : []),
  ]
}

/** Windings with a step that begins or ends at a pin; twice where both do. */
function endsAt(input: CheckInput, pin: string) {
  const all = wired(input)
  return input.document.specification.sequence.flatMap((step) => {
    const one = step.kind === 'winding' ? all.find(({ winding }) => winding.id === step.windingId) : undefined
    return one && step.kind === 'winding' ? [step.startTerminal, step.finishTerminal].filter((terminal) => terminal === pin).map(() => one) : []
  })
}

/** Wire up to here is wrapped round a pin; beyond the second it is not, whoever winds it, mm. Source: common practice. */
const WRAPPED_MM = 1
const NEVER_WRAPPED_MM = 1.2

const thickWires = (input: CheckInput): Outcome[] =>
  onPins(input).filter(({ row }) => row.form === 'round').map(({ winding, row, path }) => {
    const values = { winding: winding.name }
    return row.conductorMm > NEVER_WRAPPED_MM
      ? atMost({ value: row.conductorMm, limit: NEVER_WRAPPED_MM, unit: 'mm', path, values })
      : { ...atMost({ value: row.conductorMm, limit: WRAPPED_MM, unit: 'mm', path, values }), severity: row.conductorMm > WRAPPED_MM ? ('M' as const) : ('S' as const) }
  })

/** Thinner wire breaks at the corner of a pin unless a slack loop or a skein takes the strain, mm. */
const FRAGILE_MM = 0.1

const thinWires = (input: CheckInput): Outcome[] =>
  onPins(input).filter(({ row }) => row.form === 'round' && row.conductorMm < FRAGILE_MM).map(({ winding, row, path }) =>
    atLeast({ value: row.conductorMm, limit: FRAGILE_MM, unit: 'mm', path, values: { winding: winding.name } }))

/** Strands that one pin's joint wets through. Source: common practice. */
const STRANDS_PER_PIN = 100

function litzOnPins(input: CheckInput): Outcome[] {
  const sizeMm = pinSizeMm(input)
  return onPins(input).filter(({ row }) => row.form === 'litz').flatMap(({ winding, row, path }) => {
    const values = { winding: winding.name }
    return [
      atMost({ value: row.strands * winding.wire.parallel, limit: STRANDS_PER_PIN, unit: '', path, values }),
      atMost({ value: row.overallMm[winding.wire.insulation], limit: sizeMm === null ? null : 1.5 * sizeMm, unit: 'mm', path, values }),
    ]
  })
}

/** Highest class of which solderable enamels are made, °C. Source: IEC 60317-20, -51 and -23. */
const SOLDERABLE_CLASS_C = 180

const isEnamelled = ({ wire }: Winding) => wire.insulation.startsWith('enamel')

/** Enamel of a higher class has to be stripped by hand or tool, at every joint. */
const solderableEnamel = (input: CheckInput): Outcome[] =>
  onPins(input).filter(({ winding }) => isEnamelled(winding)).map(({ winding, path }) =>
    atMost({ value: winding.wire.thermalClassC, limit: SOLDERABLE_CLASS_C, unit: '°C', path, values: { winding: winding.name } }))

/** Class from which on solderable enamel needs a bath above 400 °C. Source: IEC 60317-23, -51. */
const HOT_BATH_CLASS_C = 180

/** A thermoplastic former's pins shift in such a bath. */
function formerInBath(input: CheckInput): Outcome[] {
  const { former } = input.document.specification
  const plastic = former.plastic.value ?? input.context.former?.plastic ?? null
  const hot = onPins(input).filter(({ winding }) => isEnamelled(winding) && winding.wire.thermalClassC >= HOT_BATH_CLASS_C)
  if (hot.length === 0) return []
  if (plastic === null) return [notCheckable('former.plastic')]
  return [yesNo(plastic === 'thermoset', 'former.plastic', { winding: hot.map(({ winding }) => winding.name).join(', ') })]
}

/** At which temperature insulated wire is stripped and soldered its maker says. */
const insulatedWireBath = (input: CheckInput): Outcome[] =>
  onPins(input).filter(({ winding }) => isInsulatedWire(winding)).map(({ winding, path }) => notCheckable(`${path}.certificate`, { winding: winding.name }))

/** Leads of two protected sides that leave at one flange meet; a sleeve over one of them parts them, else a person looks. */
function crossingLeads({ document: { specification } }: CheckInput): Outcome[] {
  const exits = (ids: readonly string[]) => specification.sequence.flatMap((step) => (step.kind === 'winding' && ids.includes(step.windingId) ? [{ flange: step.leadExitStart, sleeved: step.startSleeve !== null }, { flange: step.leadExitFinish, sleeved: step.finishSleeve !== null }] : []))
  return specification.insulation.boundaries.flatMap((boundary, index) => {
    if (!protective({ boundary }) || boundary.between.some(({ kind }) => kind === 'core')) return []
    const [one, other] = boundary.between.map((end) => exits(windingsAt(specification, end).map(({ id }) => id)))
    const meeting = one!.filter((a) => other!.some((b) => a.flange === b.flange && !a.sleeved && !b.sleeved))
    const path = `insulation.boundaries.${index}`
    const values = { boundary: boundary.name }
    return [meeting.length === 0 ? yesNo(true, path, values) : notCheckable(path, { ...values, leads: meeting.length })]
  })
}

/** Bare ends of one winding at its pins bear the winding's own peak voltage. */
function ownPins(input: CheckInput): Outcome[] {
  const { former, windings, insulation } = input.document.specification
  const sizeMm = pinSizeMm(input)
  const pin = (number: string) => former.pins.find((one) => one.number === number)
  return windings.flatMap((winding, index) => {
    const [start, finish] = [pin(winding.startTerminal), pin(winding.finishTerminal)]
    if (winding.role === 'shield' || !start || !finish || start === finish) return []
    const peaks = input.evaluation.corners.flatMap((corner) => corner.windings.filter(({ windingId }) => windingId === winding.id).map((one) => Math.max(Math.abs(one.positivePeakV), Math.abs(one.negativePeakV))))
    const path = `windings.${index}.finishTerminal`
    const required = peaks.length > 0 ? recurringPeakClearanceMm({ peakV: Math.max(...peaks), pollutionDegree: insulation.pollutionDegree.value ?? 2 }) : null
    const apartMm = sizeMm === null ? null : Math.hypot(start.xMm - finish.xMm, start.yMm - finish.yMm) - sizeMm
    return [atLeast({ value: apartMm, limit: required?.state === 'known' ? required.value : null, unit: 'mm', path, values: { winding: winding.name } })]
  })
}

/** Turned by half a turn the pins must not meet the same holes. */
function keyed({ document }: CheckInput): Outcome[] {
  const present = document.specification.former.pins.filter(({ state }) => state !== 'missing')
  if (present.length === 0) return []
  const middle = (axis: 'xMm' | 'yMm') => (Math.max(...present.map((pin) => pin[axis])) + Math.min(...present.map((pin) => pin[axis]))) / 2
  const [xMm, yMm] = [middle('xMm'), middle('yMm')]
  const turned = (a: Pin, b: Pin) => Math.abs(2 * xMm - a.xMm - b.xMm) < 0.1 && Math.abs(2 * yMm - a.yMm - b.yMm) < 0.1
  return [yesNo(!present.every((pin) => present.some((other) => turned(pin, other))), 'former.pins')]
}

/** Pins through a board of 1.6 mm with 1 mm to spare, and no longer than is cut off, mm. Source: common practice. */
const PIN_LENGTH_MM = { least: 2.6, greatest: 4.5 } as const

const isReflow = ({ document }: CheckInput) => document.specification.packing.solderProfile.value === 'reflow'

function pinLength(input: CheckInput): Outcome[] {
  const { former } = input.document.specification
  if (former.pins.length === 0 || isReflow(input)) return []
  const value = former.pinLengthMm.value
  const path = 'former.pinLengthMm'
  return [value !== null && value > PIN_LENGTH_MM.greatest ? atMost({ value, limit: PIN_LENGTH_MM.greatest, unit: 'mm', path }) : atLeast({ value, limit: PIN_LENGTH_MM.least, unit: 'mm', path })]
}

/** The hole passes the pin's diagonal with 0.2 mm to spare. Source: IPC-2222. */
function pinHole(input: CheckInput): Outcome[] {
  const { former } = input.document.specification
  if (former.pins.length === 0 || isReflow(input)) return []
  const section = former.pinSection.value ?? input.context.former?.pinSection ?? null
  const acrossMm = section === null ? null : section.sizeMm * (section.shape === 'square' ? Math.SQRT2 : 1)
  return [atLeast({ value: former.recommendedHoleMm.value, limit: acrossMm === null ? null : acrossMm + 0.2, unit: 'mm', path: 'former.recommendedHoleMm' })]
}

/** Coplanarity of pads that a paste print evens out, mm. Source: common practice. */
const COPLANARITY_MM = 0.15

function surfaceMounted(input: CheckInput): Outcome[] {
  if (!isReflow(input)) return []
  const { former, packing } = input.document.specification
  const level = (packing.moistureLevel.value ?? '').trim() !== ''
  return [atMost({ value: former.coplanarityMm.value, limit: COPLANARITY_MM, unit: 'mm', path: 'former.coplanarityMm' }), yesNo(level, 'packing.moistureLevel')]
}

const leadFree = ({ document }: CheckInput): Outcome[] => [yesNo((document.specification.compliance.rohs.value ?? '').trim() !== '', 'compliance.rohs')]

const flyingLeads = ({ document }: CheckInput): Outcome[] =>
  document.specification.former.flyingLeads.map((lead, index) => {
    const complete = lead.lengthMm > 0 && lead.stripLengthMm > 0 && lead.wireStyle.trim() !== '' && lead.measuredFrom.trim() !== ''
    return yesNo(complete, `former.flyingLeads.${index}`, { terminal: lead.name })
  })

/** Whether the board's footprint was drawn from the top view or from the bottom view only its drawing shows. */
const footprint = ({ document }: CheckInput): Outcome[] => {
  const { former, title } = document.specification
  if (former.pins.length === 0) return []
  const at = title.relatedDocuments.findIndex(({ kind }) => kind === 'footprint')
  return [notCheckable(at < 0 ? 'former.pinView' : `title.relatedDocuments.${at}`, { view: former.pinView.value ?? '' })]
}

export const JOINT_CHECKS: Readonly<Record<string, Check>> = {
  P04: { severity: 'M', source: 'three wires, two wraps each: common practice', run: wiresPerPin },
  P05: { severity: 'S', source: 'wrapping of wire round pins: common practice', run: thickWires },
  P06: { severity: 'M', source: 'breakage at the pin’s corner: common practice', run: thinWires },
  P07: { severity: 'M', source: 'solder through all strands: common practice', run: litzOnPins },
  P08: { severity: 'S', source: 'solderable enamels: IEC 60317-20, -51, -23', run: solderableEnamel },
  P09: { severity: 'M', source: 'bath above 400 °C: common practice', run: formerInBath },
  P10: { severity: 'M', source: 'data of the wire’s maker', decidedBy: 'person', run: insulatedWireBath },
  P12: { severity: 'S', source: 'IEC 62368-1, G.5.3', run: crossingLeads },
  P13: { severity: 'M', source: 'IEC 60664-1:2020, Table F.8', run: ownPins },
  P15: { severity: 'M', source: 'pattern of the pins: geometry', run: keyed },
  P16: { severity: 'M', source: 'board of 1.6 mm: common practice', run: pinLength },
  P17: { severity: 'M', source: 'IPC-2222', run: pinHole },
  P18: { severity: 'M', source: 'J-STD-020, IEC 60068-2-58', run: surfaceMounted },
  P19: { severity: 'N', source: '2011/65/EU', run: leadFree },
  P20: { severity: 'M', source: 'common practice', run: flyingLeads },
  P21: { severity: 'S', source: 'views of the pin-out: common practice', decidedBy: 'person', run: footprint },
}
