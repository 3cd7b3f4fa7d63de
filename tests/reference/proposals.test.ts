import { describe, expect, it } from 'vitest'
import { shippedLibrary } from '#server/db/seed/parts/library'
import { BUOY_SUPPLY, COUPLED_INDUCTOR, HARBOUR_SUPPLY } from '#server/db/seed/specifications/requirements'
import { specificationDocumentSchema } from '#shared/contracts/specification-document'
import { blankSpecification, evaluate, propose, refresh, reproposeTests } from '#shared/engine/index'
import type { Evaluation } from '#shared/engine/evaluation'
import type { FlybackDuty, RequirementSheet, SpecificationDocument, Winding } from '#shared/engine/specification'
import { shownAt, shownFigures } from './shown-figures'

const library = shippedLibrary()
const SHEETS = { 'buoy supply': BUOY_SUPPLY, 'harbour supply': HARBOUR_SUPPLY, 'coupled inductor': COUPLED_INDUCTOR }
const proposals = Object.entries(SHEETS).map(([name, sheet]) => {
  const proposal = propose(sheet, library)
  return { name, sheet, proposal, evaluation: evaluate(proposal.document, library, { working: true }) }
})
const byName = (name: keyof typeof SHEETS) => proposals.find((one) => one.name === name)!

/** What only people can fill: whose drawing it is, and its number. */
const BY_PEOPLE = new Set(['title.legalOwner', 'title.partNumber'])

/** Stopping checks that are neither met nor left to people. */
const stoppingChecks = ({ checks }: Evaluation) => checks.filter(({ severity, state, path }) => severity === 'S' && state !== 'met' && !BY_PEOPLE.has(path))

/**
 * Questions that a proposal leaves to people: self-resonance (E23, Q06), the date of the list of substances (D10), keying of the
 * pins (P15); of insulated wire its certificate, system, stripped ends and bath (I11, I12, T13, P10); impulse on the mains (I25);
 * ends on one pin that a former with so few pins asks for (P04, P07); how leakage of low impedance is measured (Q07, Q08); wire beside
 * the gap, which loses more than the rules of skin and proximity want (T02, T03); rows whose source is not sure (L02).
 */
const MUST_BE_ANSWERED = new Set(['D10', 'E23', 'I11', 'I12', 'I25', 'L02', 'P04', 'P07', 'P10', 'P15', 'Q06', 'Q07', 'Q08', 'T02', 'T03', 'T13'])

describe.each(proposals)('the proposal for the $name', ({ proposal, evaluation, sheet }) => {
  const { specification } = proposal.document

  it('can be released: no stopping check fails but for the title block', () => {
    const stopping = stoppingChecks(evaluation)
    expect(stopping.filter(({ state }) => state === 'not-met')).toEqual([])
    // Creepage above 30 kHz rests on a table of IEC 60664-4 that is not held; across protective boundaries a person answers.
    // L01: former, tape, sleeve and insulated wire have figures that nobody's data sheet stands behind; how far pins lie from the core
    // and how wide the former's slots are is not held; the footprint (P21) a person lays beside the pin-out.
    expect(new Set(stopping.map(({ code }) => code))).toEqual(new Set(sheet.insulationMethod === 'functional' ? ['L01', 'P21', 'W17'] : ['I06', 'I15', 'L01', 'P21', 'W17']))
  })

  it('leaves open among the checks that must be answered only what no sheet says and what few pins allow', () => {
    const asked = evaluation.checks.filter(({ severity, state }) => severity === 'M' && state !== 'met')
    expect(asked.map(({ code }) => code).filter((code) => !MUST_BE_ANSWERED.has(code))).toEqual([])
  })

  it('is an admitted document in which nobody has entered anything', () => {
    expect(specificationDocumentSchema.safeParse(proposal.document).success).toBe(true)
    expect(JSON.stringify(specification)).not.toContain('"kind":"entered"')
  })

  it('has findings for the rows that nobody vouches for and no errors', () => {
    expect(proposal.findings.filter(({ severity }) => severity === 'error')).toEqual([])
    expect(proposal.findings.some(({ code }) => code === 'generic-row-used')).toBe(true)
  })

  it('keeps the worst flux under the share of saturation that the sheet permits', () => {
    const { magnetics } = evaluation
    expect(magnetics.fluxWorstT! / magnetics.saturationT!).toBeLessThanOrEqual(sheet.fluxUtilisation)
    const core = library.cores.find(({ id }) => id === specification.core.core.value!.id)!
    const turns = specification.windings[0]!.turns
    expect(magnetics.fluxWorstT).toBeCloseTo((magnetics.inductanceMaximumH! * magnetics.worstCurrentA!) / (turns * core.minimumAreaMm2 * 1e-6), 9)
  })

  it('states A_L, inductance and turns that agree', () => {
    const { nominalH } = specification.electrical.inductance.value!
    // Both are rounded to three digits at most.
    expect(Math.abs((specification.core.gap.alH.value! * specification.windings[0]!.turns ** 2) / nominalH - 1)).toBeLessThanOrEqual(0.005)
  })

  it('tests every winding and every boundary, with ratio limits that find one turn', () => {
    const rows = (characteristic: string) => specification.tests.filter((row) => row.characteristic === characteristic)
    expect(rows('dc-resistance').map(({ windingId }) => windingId)).toEqual(specification.windings.map(({ id }) => id))
    expect(rows('hipot').map(({ boundaryId }) => boundaryId)).toEqual(specification.insulation.boundaries.map(({ id }) => id))
    for (const row of rows('turns-ratio')) {
      const most = Math.max(...specification.windings.map(({ turns }) => turns))
      expect(row.maximum! / row.nominal! - 1).toBeLessThan(1 / most)
    }
    expect(specification.tests.map(({ number }) => number)).toEqual(specification.tests.map((_, index) => index + 1))
    expect(new Set(specification.tests.map(({ symbol }) => symbol)).size).toBe(specification.tests.length)
  })

  it('has resistances that a hand calculation from length and area gives', () => {
    evaluation.windings.forEach((result, index) => {
      const winding = specification.windings[index]!
      const wire = library.wires.find(({ id }) => id === winding.wire.wire.id)!
      // IEC 60317-0-1: 58.5 m/(Ω·mm²); litz strands are 2 % longer than the bundle.
      const byHand = (result.wireLengthM! * (wire.form === 'litz' ? 1.02 : 1)) / (58.5 * result.copperAreaMm2)
      expect(result.dcResistance20Ohm! / byHand).toBeCloseTo(1, 2)
      expect(winding.dcResistance!.maximumOhm).toBeGreaterThan(result.dcResistance20Ohm! * 1.1)
    })
  })

  it('says of every figure that it shows how it came about', () => {
    for (const path of shownFigures(evaluation)) {
      expect(evaluation.working[path], path).toBeDefined()
      expect(evaluation.working[path]!.value, path).toBe(shownAt(evaluation, path))
      expect(evaluation.working[path]!.source, path).not.toBe('')
    }
  })

  it('comes out the same a second time, and stays as it is when nothing was edited', () => {
    expect(propose(sheet, library).document).toEqual(proposal.document)
    expect(refresh(proposal.document, library)).toEqual(proposal.document)
  })
})

describe('the three sheets', () => {
  it('gives the buoy supply its outputs within a percent by whole turns', () => {
    const { specification } = byName('buoy supply').proposal.document
    const turns = (name: string) => specification.windings.find((winding) => winding.name === name)!.turns
    const perTurnV = 5.7 / turns('S1')
    expect(perTurnV * turns('S2')).toBeCloseTo(15.7, 0)
    expect(Math.abs((perTurnV * turns('S2')) / 15.7 - 1)).toBeLessThan(0.01)
    expect(turns('S3')).toBe(turns('S2'))
  })

  it('parts the harbour supply’s mains from its output by reinforced insulation', () => {
    const { proposal, evaluation } = byName('harbour supply')
    const index = proposal.document.specification.insulation.boundaries.findIndex(({ name }) => name === 'PRI–SEC')
    const boundary = evaluation.boundaries[index]!
    expect(boundary.insulation).toBe('reinforced')
    // 240 V, category II: 2.5 kV, reinforced for 4 kV. Source: IEC 60664-1:2020, Tables F.1 and F.2.
    expect(boundary.required.clearanceMm.value).toBe(3)
    // The drain swings by 450 V on a rail that the mains puts at earth for half the time: about 300 V rms, 550 V peak.
    expect(boundary.workingVoltageVRms).toBeGreaterThan(280)
    expect(boundary.workingVoltageVRms).toBeLessThan(310)
    // 264 V · √2 + 90 V reflected + 90 V spike, less what the secondary returns.
    expect(boundary.recurringPeakV).toBeGreaterThan(550)
    expect(boundary.recurringPeakV).toBeLessThan(575)
    // IEC 62368-1: 4 kV peak, 2828 V rms.
    expect(boundary.required.testVoltageVRms.value).toBeCloseTo(2828.4, 0)
    expect(proposal.document.specification.insulation.boundaries[index]!.test!.voltageV).toBe(3000)
    expect(proposal.document.specification.windings.filter(({ wire }) => wire.insulation === 'triple-insulated').map(({ name }) => name)).toEqual(['S1'])
  })

  it('puts primary and secondary pins of the harbour supply in opposite rows', () => {
    const { specification } = byName('harbour supply').proposal.document
    const row = (terminal: string) => Math.sign(specification.former.pins.find(({ number }) => number === terminal)!.xMm)
    for (const { side, startTerminal, finishTerminal } of specification.windings) {
      expect([row(startTerminal), row(finishTerminal)]).toEqual(side === 'primary' ? [-1, -1] : [1, 1])
    }
  })

  it('winds the coupled inductor 1:1 with one wire', () => {
    const [first, second] = byName('coupled inductor').proposal.document.specification.windings as [Winding, Winding]
    expect(second.turns).toBe(first.turns)
    expect(second.wire).toEqual(first.wire)
  })
})

// ---------------------------------------------------------------------------------------------

const flyback = (sheet: RequirementSheet) => sheet.duty as FlybackDuty

describe('other sheets', () => {
  it('finds the conduction that was asked for', () => {
    const modeOf = (conduction: FlybackDuty['conduction']) => {
      const sheet = { ...BUOY_SUPPLY, duty: { ...flyback(BUOY_SUPPLY), conduction, currentLimit: { nominalA: 11, tolerance: 0.05, delayS: 100e-9 } } }
      const { document } = propose(sheet, library)
      return evaluate(document, library).corners.find(({ name }) => name === 'minimum-input')!
    }
    expect(modeOf({ kind: 'continuous', rippleRatio: 0.5 }).mode).toBe('continuous')
    expect(modeOf({ kind: 'discontinuous', idleShare: 0.15 }).mode).toBe('discontinuous')
    const boundary = modeOf({ kind: 'boundary' })
    // A_L is rounded to three digits, so the boundary is hit within a percent: the lowest current is next to nothing.
    const lowest = Math.min(...boundary.windings[0]!.currentWaveform.filter(([, currentA]) => currentA > 0).map(([, currentA]) => currentA))
    expect(boundary.mode === 'discontinuous' || lowest < 0.05 * boundary.windings[0]!.peakA).toBe(true)
  })

  it('gives margin tape to enamelled wire, wide enough for the creepage', () => {
    const { document } = propose({ ...HARBOUR_SUPPLY, insulationMethod: 'margin-tape' }, library)
    const evaluation = evaluate(document, library)
    const boundary = evaluation.boundaries.find(({ name }) => name === 'PRI–SEC')!
    expect(document.specification.sequence.some(({ kind }) => kind === 'margin')).toBe(true)
    expect(boundary.provided.creepageMm!).toBeGreaterThanOrEqual(boundary.required.creepageMm.value!)
    expect(boundary.provided.layers).toBe(3)
    expect(new Set(stoppingChecks(evaluation).map(({ code, state }) => `${code} ${state}`))).toEqual(new Set(['I06 not-checkable', 'I13 not-checkable', 'I15 not-checkable', 'L01 not-checkable', 'P21 not-checkable', 'W17 not-checkable']))
  })

  it('says why a sheet cannot be solved instead of proposing', () => {
    const { document, findings } = propose({ ...BUOY_SUPPLY, duty: { ...flyback(BUOY_SUPPLY), switchDropV: 30 } }, library)
    expect(findings.map(({ code }) => code)).toEqual(['duty-not-solvable'])
    expect(document.specification).toEqual(blankSpecification())
  })

  it('says that no core fits a height, and which were nearest', () => {
    const { findings, reasons } = propose({ ...BUOY_SUPPLY, maximumHeightMm: 12 }, library)
    expect(findings.some(({ code, severity }) => code === 'no-core-fits' && severity === 'error')).toBe(true)
    expect(reasons.some(({ code }) => code === 'core-rejected')).toBe(true)
  })

  it('does not call a part safe against saturation whose current limit nobody stated', () => {
    const { document, findings } = propose({ ...BUOY_SUPPLY, duty: { ...flyback(BUOY_SUPPLY), currentLimit: null } }, library)
    expect(findings.map(({ code }) => code)).toContain('current-limit-assumed')
    expect(evaluate(document, library).checks.find(({ code }) => code === 'E01')!.state).toBe('not-checkable')
  })
})

// ---------------------------------------------------------------------------------------------

describe('editing a proposal', () => {
  const base = byName('buoy supply').proposal.document
  const edited = (change: (specification: SpecificationDocument['specification']) => void): SpecificationDocument => {
    const copy = structuredClone(base)
    change(copy.specification)
    return copy
  }
  const checkOf = (document: SpecificationDocument, code: string) => evaluate(document, library).checks.filter((check) => check.code === code)

  it('finds turns that differ between winding and sequence, and names both places', () => {
    const document = edited((specification) => { specification.windings[0]!.turns += 1 })
    const finding = evaluate(document, library).findings.find(({ code }) => code === 'sequence-turns-differ')!
    expect(finding.path).toBe('windings.0.turns')
    expect(finding.values).toMatchObject({ other: 'sequence' })
    expect(checkOf(document, 'D07').some(({ state, path }) => state === 'not-met' && path === 'windings.0.turns')).toBe(true)
  })

  it('finds a pin that does not exist', () => {
    const document = edited((specification) => { specification.windings[1]!.startTerminal = '99' })
    expect(checkOf(document, 'P02').filter(({ state }) => state === 'not-met').map(({ path }) => path)).toEqual(['windings.1.startTerminal'])
  })

  it('finds A_L and gap that both control', () => {
    const document = edited((specification) => { specification.core.gap.lengthMm.status = 'mandatory' })
    expect(evaluate(document, library).findings.map(({ code }) => code)).toContain('gap-and-al-both-control')
    expect(checkOf(document, 'E08').some(({ state }) => state === 'not-met')).toBe(true)
  })

  it('finds a flux that is too high when a turn is taken off', () => {
    const document = edited((specification) => {
      specification.windings[0]!.turns -= 2
      for (const step of specification.sequence) if (step.kind === 'winding' && step.windingId === 'w1') step.turns -= 2
    })
    expect(checkOf(document, 'E01')[0]!.state).toBe('not-met')
    expect(checkOf(document, 'E07')[0]!.state).toBe('not-met')
  })

  it('brings A_L, currents, limits and proposed test rows up to date, and keeps what was entered', () => {
    const document = edited((specification) => {
      specification.windings[0]!.turns += 2
      specification.windings[0]!.origin = { kind: 'entered' }
      for (const step of specification.sequence) if (step.kind === 'winding' && step.windingId === 'w1') step.turns += 2
      const row = specification.tests.find(({ symbol }) => symbol === 'Lk P')!
      row.origin = { kind: 'entered' }
      row.maximum = 0.5e-6
    })
    const { specification } = refresh(document, library)
    expect(specification.core.gap.alH.value! * specification.windings[0]!.turns ** 2).toBeCloseTo(base.specification.electrical.inductance.value!.nominalH, 6)
    expect(specification.windings[0]!.dcResistance!.nominalOhm).toBeGreaterThan(base.specification.windings[0]!.dcResistance!.nominalOhm)
    expect(specification.tests.find(({ symbol }) => symbol === 'P:S1')!.nominal).toBeCloseTo(specification.windings[0]!.turns / specification.windings[1]!.turns, 3)
    expect(specification.tests.filter(({ symbol }) => symbol === 'Lk P').map(({ maximum }) => maximum)).toEqual([0.5e-6])
    expect(evaluate({ ...document, specification }, library).checks.find(({ code }) => code === 'E07')!.state).toBe('met')
  })

  it('proposes test rows again without touching a row that a person wrote', () => {
    const document = edited((specification) => {
      const [first] = specification.tests
      specification.tests = [{ ...first!, id: 'own', symbol: 'Z P', characteristic: 'self-resonance', unit: 'Hz', minimum: 1e6, nominal: null, maximum: null, origin: { kind: 'entered' } }]
    })
    const { tests } = reproposeTests(document).specification
    expect(tests.find(({ id }) => id === 'own')).toMatchObject({ symbol: 'Z P', minimum: 1e6 })
    expect(tests.length).toBe(base.specification.tests.length + 1)
  })

  it('works without a requirement sheet on the stated currents', () => {
    const evaluation = evaluate({ specification: base.specification, requirement: null }, library)
    expect(evaluation.corners).toEqual([])
    expect(evaluation.windings.every(({ copperLossW }) => copperLossW !== null && copperLossW > 0)).toBe(true)
    // Without waveforms the flux swing is not known, and neither is the core's loss.
    expect(evaluation.losses.coreW).toBeNull()
    expect(evaluation.checks.find(({ code }) => code === 'T07')!.state).toBe('not-checkable')
    expect(evaluation.magnetics.fluxWorstT).toBeGreaterThan(0.2)
  })
})
