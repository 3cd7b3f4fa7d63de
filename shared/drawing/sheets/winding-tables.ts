import type { SequenceStep, Winding, WindingSpecification, WindingStep } from '../../engine/specification'
import type { Column, Row, TableContent } from '../table'
import { celsius, inUnit, joined, millimetres, plain, STATUS_LETTERS } from './figures'
import { findRow, rowName, type DrawingInput } from './input'
import { DIRECTION_WORDS, LAY_WORDS, SIDE_WORDS, stepWords, WIRE_INSULATION_WORDS } from './words'

const WINDING_COLUMNS: readonly Column[] = [
  { key: 'name', header: 'Winding', font: 'sans-bold', always: true },
  { key: 'side', header: 'Side' },
  { key: 'start', header: 'Start (dot)', group: 'Pin', align: 'middle', always: true },
  { key: 'finish', header: 'Finish', group: 'Pin', align: 'middle', always: true },
  { key: 'turns', header: 'Turns', align: 'decimal', always: true },
  { key: 'wire', header: 'Wire' },
  { key: 'rms', header: 'r.m.s.', group: 'Current in A', align: 'decimal' },
  { key: 'peak', header: 'peak', group: 'Current in A', align: 'decimal' },
  { key: 'dc', header: 'd.c.', group: 'Current in A', align: 'decimal' },
  { key: 'dcrMin', header: 'min.', group: 'DC resistance in mΩ', align: 'decimal' },
  { key: 'dcrNom', header: 'nom.', group: 'DC resistance in mΩ', align: 'decimal' },
  { key: 'dcrMax', header: 'max.', group: 'DC resistance in mΩ', align: 'decimal' },
  { key: 'dcrAt', header: 'at' },
  { key: 'status', header: 'M/R/V', align: 'middle' },
]

/** Windings with terminals, turns, wire, currents and limits of resistance. */
export function windingTable(input: DrawingInput): TableContent {
  return { title: 'Windings', columns: WINDING_COLUMNS, rows: input.specification.windings.map((winding) => windingRow(input, winding)) }
}

function windingRow(input: DrawingInput, winding: Winding): Row {
  const limit = winding.dcResistance
  return {
    tag: `winding:${winding.id}`,
    cells: {
      name: winding.name,
      side: winding.role === 'auxiliary' ? `${SIDE_WORDS[winding.side]}, auxiliary` : SIDE_WORDS[winding.side],
      start: winding.startTerminal,
      finish: winding.finishTerminal,
      turns: plain(winding.turns),
      wire: wireText(input, winding),
      rms: inUnit(winding.rmsCurrentA, 'A'),
      peak: inUnit(winding.peakCurrentA, 'A'),
      dc: inUnit(winding.dcCurrentA, 'A'),
      dcrMin: inUnit(limit?.minimumOhm, 'mΩ'),
      dcrNom: inUnit(limit?.nominalOhm, 'mΩ'),
      dcrMax: inUnit(limit?.maximumOhm, 'mΩ'),
      dcrAt: limit ? joined([celsius(limit.temperatureC), limit.fourTerminal ? '4-terminal' : '2-terminal']) : '',
      status: STATUS_LETTERS[winding.status],
    },
  }
}

/** `2 × AWG 24, enamelled, grade 2, class 155`. */
export function wireText({ library }: DrawingInput, { wire }: Winding): string {
  const row = findRow(library, 'wire', wire.wire)
  const count = wire.parallel > 1 ? `${plain(wire.parallel)} × ` : ''
  const lay = wire.lay ? `lay ${millimetres(wire.lay.lengthMm)} ${wire.lay.direction}` : ''
  const insulation = row?.form === 'foil' ? '' : WIRE_INSULATION_WORDS[wire.insulation]
  return joined([`${count}${rowName(library, wire.wire)}`, insulation, `class ${celsius(wire.thermalClassC)}`, lay])
}

const SEQUENCE_COLUMNS: readonly Column[] = [
  { key: 'step', header: 'Step', align: 'middle', font: 'sans-bold', always: true },
  { key: 'what', header: 'Operation', always: true },
  { key: 'start', header: 'Start', group: 'Pin', align: 'middle' },
  { key: 'finish', header: 'Finish', group: 'Pin', align: 'middle' },
  { key: 'turns', header: 'Turns', align: 'decimal' },
  { key: 'material', header: 'Wire, tape, sleeve' },
  { key: 'parallel', header: 'Parallel wires', align: 'middle' },
  { key: 'layers', header: 'Layers', align: 'middle' },
  { key: 'section', header: 'Section', align: 'middle' },
  { key: 'direction', header: 'Direction from pin side', align: 'middle' },
  { key: 'lay', header: 'Lay' },
  { key: 'left', header: 'left', group: 'Margin, mm', align: 'decimal' },
  { key: 'right', header: 'right', group: 'Margin, mm', align: 'decimal' },
  { key: 'width', header: 'Width mm', align: 'decimal' },
  { key: 'interlayer', header: 'Tape between layers' },
  { key: 'exits', header: 'Lead exit start / finish', align: 'middle' },
  { key: 'sleeves', header: 'Lead sleeves' },
  { key: 'remark', header: 'Remark' },
  { key: 'status', header: 'M/R/V', align: 'middle' },
]

/** One row per operation, from the former outward. */
export function sequenceTable(input: DrawingInput): TableContent {
  const rows = input.specification.sequence.map((step, index) => ({
    tag: `step:${step.id}`,
    cells: {
      step: String(index + 1),
      what: stepWords(input.specification, step),
      remark: step.remark,
      status: STATUS_LETTERS[step.status],
      ...stepCells(input, step),
    },
  }))
  return { title: 'Winding sequence, from the former outward', columns: SEQUENCE_COLUMNS, rows }
}

function stepCells(input: DrawingInput, step: SequenceStep): Row['cells'] {
  const name = (reference: Parameters<typeof rowName>[1]) => rowName(input.library, reference)
  switch (step.kind) {
    case 'winding':
      return windingCells(input, step)
    case 'tape':
      return { material: name(step.tape), layers: plain(step.layers), width: step.widthMm === null ? 'full' : plain(step.widthMm) }
    case 'margin':
      return {
        material: joined([name(step.tape), step.heightMm === null ? 'built up to the winding' : `height ${millimetres(step.heightMm)}`]),
        left: plain(step.leftMm),
        right: plain(step.rightMm),
      }
    case 'shield':
      return {
        start: step.connectedTerminal,
        finish: 'insulated',
        width: plain(step.widthMm),
        material: `thickness ${millimetres(step.thicknessMm)}, ends overlap ${millimetres(step.overlapMm)}, insulated by ${step.overlapInsulation}: no shorted turn`,
      }
    case 'sleeve':
      return { material: joined([name(step.sleeve), `length ${millimetres(step.lengthMm)}`]) }
    case 'core-tape':
      return { material: name(step.tape), layers: plain(step.layers) }
    case 'varnish':
      return {}
  }
}

function windingCells(input: DrawingInput, step: WindingStep): Row['cells'] {
  const winding = input.specification.windings.find(({ id }) => id === step.windingId)
  const predicted = input.evaluation?.layout.items.filter((item) => item.kind === 'turn' && item.stepId === step.id) ?? []
  const layers = new Set(predicted.map((item) => (item.kind === 'turn' ? item.layer : 0))).size
  const sleeve = (lead: string, use: WindingStep['startSleeve']) =>
    use && `${lead}: ${rowName(input.library, use.sleeve)}, ${millimetres(use.lengthMm)}, ${millimetres(use.intoWindingMm)} into the winding`
  return {
    start: step.startTerminal,
    finish: step.finishTerminal,
    turns: plain(step.turns),
    material: winding ? wireMaterial(input, winding) : '',
    parallel: winding ? plain(winding.wire.parallel) : '',
    layers: step.layers !== null ? plain(step.layers) : layers > 0 ? `(${layers})` : '',
    section: plain(step.section),
    direction: DIRECTION_WORDS[step.direction],
    lay: LAY_WORDS[step.lay],
    left: plain(step.marginLeftMm),
    right: plain(step.marginRightMm),
    interlayer: rowName(input.library, step.interlayerTape),
    exits: `${step.leadExitStart} / ${step.leadExitFinish}`,
    sleeves: joined([sleeve('start', step.startSleeve), sleeve('finish', step.finishSleeve)], '\n'),
  }
}

const wireMaterial = ({ library }: DrawingInput, { wire }: Winding) => joined([rowName(library, wire.wire), WIRE_INSULATION_WORDS[wire.insulation]])

/** Terminal by terminal: what it carries and where it stands, seen from above. */
export function pinRows(specification: WindingSpecification, texts: readonly { name: string; use: string }[]): Row[] {
  return texts.map(({ name, use }) => {
    const pin = specification.former.pins.find(({ number }) => number === name)
    return { tag: `pin:${name}`, cells: { name, use, x: plain(pin?.xMm), y: plain(pin?.yMm) } }
  })
}

