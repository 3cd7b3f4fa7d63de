import { betweenF, capacitanceNetwork, joined, perTurnSquaredF } from '#shared/engine/parasitics/capacitance-network'
import { faces } from '#shared/engine/parasitics/electrodes'
import type { Electrode, WireElectrode } from '#shared/engine/parasitics/electrodes'
import { wireCellFPerM } from '#shared/engine/parasitics/wire-cell'
import { describe, expect, it } from 'vitest'

// Source: two-dimensional finite elements (second order, gmsh meshes; samples cross-checked with GetDP), 0.4 mm wire, 0.439 mm
// over enamel of ε 3.5, tape of ε 3.3, air between the wires, each wire sunk 2 µm into the tape. Per metre of turn length.
const WIRE = { conductorMm: 0.4, overallMm: 0.439, enamelPermittivity: 3.5, tapePermittivity: 3.3 }
const PITCH_MM = 0.44778
const SUNK_MM = 2 * 0.002

interface Case {
  name: string
  wall: 'plane' | 'staggered'
  tapeMm: number
  femFPerM: number
  /** Ratio to the finite elements with the tape as thick as stated, and with the wires sunk into it. */
  ratio: { onTape: number; sunk: number }
}

const CELLS: Case[] = [
  { name: 'in line, one tape', wall: 'plane', tapeMm: 0.055, femFPerM: 6.49208e-11, ratio: { onTape: 0.955, sunk: 0.981 } },
  { name: 'in line, three tapes', wall: 'plane', tapeMm: 0.165, femFPerM: 3.93828e-11, ratio: { onTape: 0.973, sunk: 0.985 } },
  { name: 'staggered half a pitch, one tape', wall: 'staggered', tapeMm: 0.055, femFPerM: 5.08943e-11, ratio: { onTape: 0.964, sunk: 0.971 } },
]

/** Two equal layers, each against the middle of the tape: two cells in series. */
const twoLayersFPerM = ({ wall, tapeMm }: Case, sunkMm: number) => wireCellFPerM({ ...WIRE, pitchMm: PITCH_MM, tapeMm: (tapeMm - sunkMm) / 2, wall }) / 2

describe('two layers of wire, each at one potential', () => {
  it.each(CELLS)('$name: within 15 %', (one) => {
    const [onTape, sunk] = [twoLayersFPerM(one, 0) / one.femFPerM, twoLayersFPerM(one, SUNK_MM) / one.femFPerM]
    expect(Math.abs(onTape - 1)).toBeLessThan(0.15)
    expect(onTape).toBeCloseTo(one.ratio.onTape, 3)
    expect(sunk).toBeCloseTo(one.ratio.sunk, 3)
  })

  it('lies between straight flow lines, which are too few, and a parallel plate, which is too much', () => {
    // Straight lines through tape, enamel and air give 5.713 and 2.823, plates at the nearest copper 14.26 · 10⁻¹¹ F/m.
    expect(twoLayersFPerM(CELLS[0]!, 0)).toBeGreaterThan(5.713e-11)
    expect(twoLayersFPerM(CELLS[2]!, 0)).toBeGreaterThan(2.823e-11)
    expect(twoLayersFPerM(CELLS[0]!, 0)).toBeLessThan(14.26e-11)
  })
})

// Same source: two layers of twelve turns, pitch 0.46095 mm, in line, one tape, one volt over all 24 turns in series.
describe('two layers of twelve turns in series', () => {
  const layer = (level: number, rightward: boolean, body = 'w'): WireElectrode => ({
    kind: 'wire', body, bottomMm: level * (0.439 + 0.055), topMm: level * (0.439 + 0.055) + 0.439, leftMm: 0, rightMm: 12 * 0.46095,
    turnsAtLeft: 12 * level + (rightward ? 0 : 12), turnsAtRight: 12 * level + (rightward ? 12 : 0), turnLengthMm: 1000,
    conductorMm: 0.4, overallMm: 0.439, pitchMm: 0.46095, turnPitchMm: 0.46095, turns: 12, parallel: 1, permittivity: 3.5,
  })
  const tape = { bottomMm: 0.439, topMm: 0.439 + 0.055, leftMm: -1, rightMm: 10, permittivity: 3.3 }
  const network = (electrodes: Electrode[]) => joined(capacitanceNetwork({ electrodes, faces: faces(electrodes, [tape]), fillPermittivity: 1, alignment: 'in-line' }), [])

  it.each([
    { name: 'U: wound back over the first', secondRightward: false, femFPerM: 2.71052e-10, ratio: 0.928 },
    { name: 'Z: wound again in the same direction', secondRightward: true, femFPerM: 2.03387e-10, ratio: 0.929 },
  ])('$name: within 15 %', ({ secondRightward, femFPerM, ratio }) => {
    const ours = perTurnSquaredF(network([layer(0, true), layer(1, secondRightward)])) / 24 ** 2
    expect(Math.abs(ours / femFPerM - 1)).toBeLessThan(0.15)
    expect(ours / femFPerM).toBeCloseTo(ratio, 2)
  })

  it('each layer at one potential: within 15 %', () => {
    const ours = betweenF(network([layer(0, true, 'a'), layer(1, true, 'b')]), ['a'], ['b'])!
    expect(ours / 8.01032e-10).toBeCloseTo(0.936, 2)
  })
})

// Source: A. Massarini and M. Kazimierczuk, IEEE Trans. Power Electron. 12 (1997) 671: limits without any layer structure.
describe('limits of the cell', () => {
  it('is a plane behind the wires’ surface, seen from afar', () => {
    const farMm = 5
    const cell = wireCellFPerM({ ...WIRE, enamelPermittivity: 1, tapePermittivity: 1, pitchMm: 0.439, tapeMm: farMm, wall: 'plane' })
    // From afar a row of wires is a plane that lies within its wires.
    const planeMm = (8.8541878128e-12 * 0.439) / cell
    expect(planeMm).toBeGreaterThan(farMm)
    expect(planeMm).toBeLessThan(farMm + 0.22)
  })

  it('is a single wire over a plane, 2πε0/arcosh(h/r), when its neighbours are far away', () => {
    const cell = wireCellFPerM({ conductorMm: 0.4, overallMm: 0.4, enamelPermittivity: 1, tapePermittivity: 1, pitchMm: 60, airMm: 0.2, tapeMm: 0, wall: 'plane' })
    expect(cell / ((2 * Math.PI * 8.8541878128e-12) / Math.acosh(2))).toBeCloseTo(1, 2)
  })
})
