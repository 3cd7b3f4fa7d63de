import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { betweenF, capacitanceNetwork, drivenF, joined, perTurnSquaredF } from './capacitance-network'
import { faces } from './electrodes'
import type { PlaneElectrode, WireElectrode } from './electrodes'
import { turnToTurnFPerM } from './turn-to-turn'
import { EPSILON_0_F_PER_M, wireCellFPerM } from './wire-cell'

/** A foil of 10 mm by 100 mm per turn at a height, one turn after another. */
const foil = (body: string, levelMm: number, turns: number): PlaneElectrode => ({ kind: 'plane', body, bottomMm: levelMm, topMm: levelMm + 0.1, leftMm: 0, rightMm: 10, turnsAtLeft: turns, turnsAtRight: turns, turnLengthMm: 100, cover: 1 })
/** Between two such foils 0.1 mm apart in air. */
const PLATE_F = (EPSILON_0_F_PER_M * 0.01 * 0.1) / 0.1e-3

const networkOf = (electrodes: PlaneElectrode[]) => capacitanceNetwork({ electrodes, faces: faces(electrodes, []), fillPermittivity: 1 })

describe('capacitanceNetwork of foils', () => {
  it('adds the foils of one winding in series', () => {
    // Three foils, one volt between neighbours: twice the energy is 2·C.
    const network = joined(networkOf([foil('w', 0, 0.5), foil('w', 0.2, 1.5), foil('w', 0.4, 2.5)]), [])
    expect(perTurnSquaredF(network)).toBeCloseTo(2 * PLATE_F, 18)
  })

  it('halves by a floating foil between two windings and screens by a tied one', () => {
    const network = networkOf([foil('a', 0, 0), foil('sh', 0.2, 0), foil('b', 0.4, 0)])
    expect(betweenF(joined(network, []), ['a'], ['b'])! / PLATE_F).toBeCloseTo(0.5, 9)
    const tied = joined(network, [{ a: { body: 'a', turns: 0 }, b: { body: 'sh', turns: 0 } }])
    expect(betweenF(tied, ['a'], ['b'])! / PLATE_F).toBeCloseTo(1, 9)
    expect(betweenF(tied, ['a'], ['sh'])).toBeNull()
  })

  it('drives the charge of the voltage that stands over the gap, and none where both ends move alike', () => {
    const network = joined(networkOf([foil('p', 0, 9.5), foil('s', 0.2, 1.5)]), [])
    const driven = (resting: 'start' | 'finish') => drivenF(network, { driven: { body: 'p', turns: 10 }, onto: { body: 's', turns: 2 }, resting })! / PLATE_F
    // 9.5 turns against 1.5 over their starts; half a turn each below their finishes.
    expect(driven('start')).toBeCloseTo(0.8, 9)
    expect(driven('finish')).toBeCloseTo(0, 9)
  })

  it('knows only the voltage between joined windings', () => {
    const electrodes = [foil('a', 0, 5), foil('b', 0.2, 0)]
    // b starts where a finishes, ten turns up: the two foils stand five turns apart.
    const network = joined(networkOf(electrodes), [{ a: { body: 'a', turns: 10 }, b: { body: 'b', turns: 0 } }])
    expect(perTurnSquaredF(network) / PLATE_F).toBeCloseTo(25, 9)
  })
})

describe('windings wound together', () => {
  const wire = (body: string, leftMm: number): WireElectrode => ({
    kind: 'wire', body, bottomMm: 0, topMm: 0.44, leftMm, rightMm: leftMm + 8, turnsAtLeft: 0, turnsAtRight: 10, turnLengthMm: 50,
    conductorMm: 0.4, overallMm: 0.44, pitchMm: 0.88, turnPitchMm: 0.88, turns: 10, parallel: 1, permittivity: 3.5,
  })
  it('couple turn beside turn, and hold no energy of their own while both rise alike', () => {
    const electrodes = [wire('a', 0), wire('b', 0.44)]
    const network = joined(capacitanceNetwork({ electrodes, faces: faces(electrodes, []), fillPermittivity: 1 }), [])
    const contacts = 19 * 0.05 * turnToTurnFPerM({ conductorMm: 0.4, overallMm: 0.44, insulationPermittivity: 3.5 })
    expect(betweenF(network, ['a'], ['b'])! / contacts).toBeCloseTo(1, 9)
    expect(perTurnSquaredF(network) / contacts).toBeLessThan(1e-6)
  })
})

describe('windings in two sections', () => {
  it('see each other through the wall, less the thicker it is', () => {
    const layer = (body: string, leftMm: number): WireElectrode => ({
      kind: 'wire', body, bottomMm: 0, topMm: 0.44, leftMm, rightMm: leftMm + 4, turnsAtLeft: 0, turnsAtRight: 9, turnLengthMm: 50,
      conductorMm: 0.4, overallMm: 0.44, pitchMm: 0.44, turnPitchMm: 0.44, turns: 9, parallel: 1, permittivity: 3.5,
    })
    const electrodes = [layer('a', 0), layer('b', 5)]
    const through = (wallMm: number) => betweenF(joined(capacitanceNetwork({ electrodes, faces: [], flanks: [{ left: electrodes[0]!, right: electrodes[1]!, commonMm: 0.44, wallMm, wallPermittivity: 5, airMm: 0 }], fillPermittivity: 1 }), []), ['a'], ['b'])!
    // Half a millimetre of plastic between two ends 0.44 mm high over 50 mm: under two picofarad as plates.
    expect(through(0.5)).toBeLessThan((EPSILON_0_F_PER_M * 5 * 0.44e-3 * 0.05) / 0.5e-3)
    expect(through(0.5)).toBeGreaterThan(through(1))
    expect(through(1)).toBeGreaterThan(0.4 * through(0.5))
  })
})

const length = fc.double({ min: 0.02, max: 2, noNaN: true })

describe('wireCellFPerM', () => {
  it('falls with the tape, rises with its permittivity, and stays below the plate at the nearest copper', () => {
    fc.assert(
      fc.property(length, fc.double({ min: 1.02, max: 1.4, noNaN: true }), fc.double({ min: 1, max: 6, noNaN: true }), length, fc.double({ min: 1, max: 5, noNaN: true }), (conductorMm, over, spacing, tapeMm, permittivity) => {
        const overallMm = conductorMm * over
        const cell = { conductorMm, overallMm, pitchMm: overallMm * spacing, tapeMm, enamelPermittivity: 3.5, tapePermittivity: permittivity, wall: 'plane' as const }
        const value = wireCellFPerM(cell)
        expect(value).toBeGreaterThan(0)
        expect(wireCellFPerM({ ...cell, tapeMm: tapeMm * 1.5 })).toBeLessThan(value)
        expect(wireCellFPerM({ ...cell, tapePermittivity: permittivity * 1.3 })).toBeGreaterThan(value)
        expect(wireCellFPerM({ ...cell, wall: 'staggered' })).toBeLessThan(value * 1.0001)
        const plateFPerM = (EPSILON_0_F_PER_M * cell.pitchMm) / ((overallMm - conductorMm) / 2 / 3.5 + tapeMm / permittivity)
        expect(value).toBeLessThan(plateFPerM)
      }),
      { numRuns: 60 },
    )
  })

  it.each([
    { change: { overallMm: 0.3 }, name: /overallMm/ },
    { change: { pitchMm: 0.4 }, name: /pitchMm/ },
    { change: { tapePermittivity: 0.5 }, name: /tapePermittivity/ },
    { change: { overallMm: 0.4, tapeMm: 0 }, name: /no insulation/ },
  ])('refuses $change', ({ change, name }) => {
    expect(() => wireCellFPerM({ conductorMm: 0.4, overallMm: 0.44, pitchMm: 0.45, tapeMm: 0.05, enamelPermittivity: 3.5, tapePermittivity: 3.3, wall: 'plane', ...change })).toThrow(name)
  })
})

describe('turnToTurnFPerM', () => {
  // G. Grandi et al., IEEE Trans. Ind. Appl. 35 (1999) 1162: a solenoid of touching bare wires in air at pitch p: πε0/arcosh(p/d).
  it('comes near two bare wires in air a diameter apart', () => {
    const value = turnToTurnFPerM({ conductorMm: 1, overallMm: 1, airMm: 1, insulationPermittivity: 1, halfAngleRad: Math.PI / 2 })
    expect(value / ((Math.PI * EPSILON_0_F_PER_M) / Math.acosh(2))).toBeGreaterThan(0.5)
    expect(value / ((Math.PI * EPSILON_0_F_PER_M) / Math.acosh(2))).toBeLessThan(1)
  })
  it('falls with the distance', () => {
    const at = (airMm: number) => turnToTurnFPerM({ conductorMm: 0.4, overallMm: 0.44, airMm, insulationPermittivity: 3.5 })
    expect(at(0)).toBeGreaterThan(at(0.02))
    expect(at(0.02)).toBeGreaterThan(at(0.2))
  })
})
