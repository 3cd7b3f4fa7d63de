import { shippedLibrary } from '#server/db/seed/parts/library'
import { BUOY_SUPPLY, COUPLED_INDUCTOR, HARBOUR_SUPPLY } from '#server/db/seed/specifications/requirements'
import type { CommonModeChokeDuty } from '#shared/engine/duties/common-mode-choke'
import { evaluate, refresh, search, searchSteps } from '#shared/engine/index'
import type { SearchCandidate, SearchOutcome } from '#shared/engine/index'
import { dominates, paretoFront } from '#shared/engine/search/front'
import type { RequirementSheet } from '#shared/engine/specification'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { expectWithin } from './relative'

const library = shippedLibrary()
const aims = ({ figures: { lossW, volumeMm3, copperG, heightMm, leakageH } }: SearchCandidate) => [lossW, volumeMm3, copperG, heightMm, leakageH]
const few = { finalists: 8 }
const sheets = [['harbour supply', HARBOUR_SUPPLY], ['buoy supply', BUOY_SUPPLY], ['coupled inductor', COUPLED_INDUCTOR]] as const
/** Each whole search once: it is the dear part of these tests. */
const whole = new Map(sheets.map(([name, sheet]) => [name, search(sheet, library)]))

describe('paretoFront', () => {
  const points = fc.array(fc.array(fc.option(fc.integer({ min: 0, max: 6 })), { minLength: 3, maxLength: 3 }), { minLength: 1, maxLength: 40 })

  it('holds just the points that none dominates, and every other is dominated by one of them', () => {
    fc.assert(fc.property(points, (all) => {
      const front = paretoFront(all)
      expect(front.length).toBeGreaterThan(0)
      all.forEach((point, index) => {
        if (front.includes(index)) expect(all.some((other) => dominates(other, point))).toBe(false)
        else expect(front.some((one) => dominates(all[one]!, point))).toBe(true)
      })
    }))
  })
})

describe.each(sheets)('the search for the %s', (name) => {
  const found: SearchOutcome = whole.get(name)!

  it('offers cores of three families, none of which breaks what stops a proposal', () => {
    expect(new Set(found.candidates.map(({ document }) => library.cores.find(({ id }) => id === document.specification.core.core.value!.id)!.shape)).size).toBeGreaterThanOrEqual(3)
    for (const { document } of found.candidates.slice(0, 3)) {
      const broken = evaluate(document, library).checks.filter(({ code, state }) => state === 'not-met' && ['E01', 'W01', 'W03', 'T11', 'I04', 'I05'].includes(code))
      expect(broken).toEqual([])
    }
  })

  it('marks just those on the front that no other candidate dominates, and lists them first', () => {
    for (const candidate of found.candidates) expect(candidate.onFront).toBe(!found.candidates.some((other) => dominates(aims(other), aims(candidate))))
    const marks = found.candidates.map(({ onFront }) => onFront)
    expect(marks).toEqual([...marks].sort((one, other) => Number(other) - Number(one)))
  })

  it('shows the figures of the full evaluation', () => {
    const best = found.candidates[0]!
    const { losses, mass, thermal } = evaluate(best.document, library)
    expectWithin(best.figures.lossW!, losses.totalW!, 1e-9)
    expectWithin(best.figures.copperG!, mass.copperG!, 1e-9)
    expectWithin(best.figures.riseK!, thermal.riseK!, 1e-9)
  })

  it('names for every core that fell out the check that it breaks', () => {
    const cores = new Set([...found.rejected.map(({ former }) => former), ...found.candidates.map(({ former }) => former)])
    expect(cores.size).toBeGreaterThan(40)
    expect(found.rejected.every(({ check }) => /^[A-Z]\d\d$/.test(check))).toBe(true)
    const both = found.rejected.filter(({ former }) => found.candidates.some((one) => one.former === former))
    expect(both).toEqual([])
  })

  it('can be taken over: the candidate becomes a whole document', () => {
    const taken = refresh(found.candidates[0]!.document, library)
    expect(taken.specification.tests.length).toBeGreaterThan(3)
    expect(taken.requirement).toEqual(found.candidates[0]!.document.requirement)
  })
})

describe('what steers a search', () => {
  it('gives the same answer twice', () => expect(search(BUOY_SUPPLY, library, few)).toEqual(search(BUOY_SUPPLY, library, few)))

  it('keeps below a height, and says so of what stands higher', () => {
    const low: RequirementSheet = { ...HARBOUR_SUPPLY, maximumHeightMm: 27 }
    const { candidates, rejected } = search(low, library, few)
    expect(candidates.length).toBeGreaterThan(0)
    expect(Math.max(...candidates.map(({ figures }) => figures.heightMm))).toBeLessThanOrEqual(26.5)
    expect(rejected.filter(({ check }) => check === 'W25').length).toBeGreaterThan(10)
  })

  it('takes the named families, materials and insulation only', () => {
    const { candidates } = search(HARBOUR_SUPPLY, library, { ...few, shapes: ['PQ', 'RM'], materialIds: ['mnzn-100khz'], insulationMethods: ['margin-tape'] })
    expect(candidates.length).toBeGreaterThan(0)
    for (const { former, material, method } of candidates) {
      expect(former).toMatch(/^(PQ|RM)/)
      expect(material).toBe(library.materials.find(({ id }) => id === 'mnzn-100khz')!.name)
      expect(method).toBe('margin-tape')
    }
  })

  it('prefers a row among equals, and keeps to the store where asked', () => {
    const free = whole.get('harbour supply')!
    const coreOf = ({ document }: SearchOutcome['candidates'][number]) => document.specification.core.core.value!.id
    const second = free.candidates.find((candidate) => coreOf(candidate) !== coreOf(free.candidates[0]!))!
    const coreId = coreOf(second)
    const preferred = search(HARBOUR_SUPPLY, library, { preferredRows: [`core/${coreId}`] })
    const place = ({ candidates }: SearchOutcome) => candidates.findIndex(({ id }) => id === second.id)
    expect(place(preferred)).toBeLessThan(place(free))
    const former = library.formers.find(({ name }) => name === second.former)!
    const stored = search(HARBOUR_SUPPLY, library, { onlyStocked: true, stockedRows: [`core/${coreId}`, `former/${former.id}`] })
    expect(new Set(stored.candidates.map((one) => one.former))).toEqual(new Set([second.former]))
    expect(stored.candidates.every(({ isStocked }) => isStocked)).toBe(true)
  })

  it('lays no windings one over the other on a former of several sections', () => {
    const halves = { ...library, formers: library.formers.map((former) => ({ ...former, sections: 2 })) }
    expect(search(BUOY_SUPPLY, halves, few)).toMatchObject({ candidates: [], rejected: [], screened: 0 })
  })

  it('takes for a common-mode choke the grades that the proposal takes', () => {
    const duty: CommonModeChokeDuty = { topology: 'common-mode-choke', ratedVoltageV: 230, lineCurrentA: 1, linePeakA: 3, lineFrequencyHz: 50, switchingFrequencyHz: 100e3, impedance: [{ frequencyHz: 100e3, minimumOhm: 1000 }] }
    const { candidates } = search({ ...BUOY_SUPPLY, duty }, library, few)
    expect(candidates.length).toBeGreaterThan(0)
    const uses = candidates.map(({ material }) => library.materials.find(({ name }) => name === material)!.use)
    expect(new Set(uses)).toEqual(new Set(['common-mode']))
  })

  it('stops when told, with what it has', () => {
    const stopped = search(HARBOUR_SUPPLY, library, {}, ({ found, stage }) => stage === 'screening' || found === 0)
    expect(stopped.stopped).toBe(true)
    expect(stopped.candidates.length).toBeGreaterThan(0)
    expect(stopped.evaluated).toBeLessThan(20)
  })

  it('reports progress that only grows, to its end', () => {
    const steps = searchSteps(BUOY_SUPPLY, library, few)
    const seen: number[] = []
    let step = steps.next()
    for (; !step.done; step = steps.next(false)) if (step.value.stage === 'evaluating') seen.push(step.value.done / step.value.total)
    expect(seen).toEqual([...seen].sort((one, other) => one - other))
    expect(seen.at(-1)).toBe(1)
  })

  it('says why a duty has no solution', () => {
    const absurd = structuredClone(BUOY_SUPPLY)
    Object.assign(absurd.duty, { switchDropV: 100 })
    expect(search(absurd, library).findings).toMatchObject([{ code: 'duty-not-solvable', path: 'requirement.duty' }])
  })
})
