import { layOutCoil } from '#shared/engine/build/index'
import type { BoundaryResult, Evaluation, SourcedValue } from '#shared/engine/evaluation'
import type { Library } from '#shared/engine/library'
import type { InsulationBoundary, SpecificationDocument } from '#shared/engine/specification'

const sourced = (value: number | null, source: string, fromMemory: boolean): SourcedValue => ({ value, source, fromMemory, reason: null })

function boundaryResult(boundary: InsulationBoundary): BoundaryResult {
  const table = 'IEC 60664-1:2020, Table F.5, pollution degree 2, material group IIIb'
  return {
    boundaryId: boundary.id,
    name: boundary.name,
    insulation: boundary.insulation,
    workingVoltageVRms: boundary.workingVoltageVRms,
    recurringPeakV: boundary.recurringPeakV,
    required: {
      clearanceMm: sourced(3, 'IEC 60664-1:2020, Table F.2', true),
      creepageMm: sourced(5.12, table, false),
      distanceThroughInsulationMm: sourced(0.4, 'IEC 62368-1:2018, 5.4.4.2', true),
      layers: sourced(3, 'IEC 62368-1:2018, 5.4.4.6', true),
      testVoltageVRms: sourced(3000, 'IEC 62368-1:2018, Table 25', true),
    },
    provided: { clearanceMm: 6.0234, creepageMm: 6.1, distanceThroughInsulationMm: 0.165, layers: 3, testVoltageVRms: null, how: 'two margins of 3 mm and three layers of tape' },
    state: 'met',
  }
}

/**
 * An evaluation whose layout is the engine's and whose insulation figures are set by hand, so that what a sheet shows
 * of them can be foretold.
 */
export function sampleEvaluation({ specification }: SpecificationDocument, library: Library): Evaluation {
  const rowOf = <T extends { id: string }>(rows: readonly T[], id: string | undefined) => rows.find((each) => each.id === id) ?? null
  const { layout } = layOutCoil({
    former: rowOf(library.formers, specification.former.former.value?.id)!,
    windings: specification.windings,
    sequence: specification.sequence,
    wireOf: ({ wire }) => {
      const found = rowOf(library.wires, wire.wire.id)
      return found && { form: found.form, overallMm: found.overallMm[wire.insulation] ?? found.conductorMm * 1.1, conductorMm: found.conductorMm, copperAreaMm2: found.copperAreaMm2, widthMm: found.widthMm }
    },
    tapeOf: (reference) => rowOf(library.tapes, reference.id),
  })
  return {
    engine: 'sample',
    corners: [],
    magnetics: {
      inductanceH: null, inductanceMinimumH: null, inductanceMaximumH: null, alH: null, gapMm: 0.3127, fringingFactor: null, gapModel: '', fluxPeakT: null,
      fluxWorstT: null, worstCurrentA: null, saturationT: null, saturationTemperatureC: null, fluxUtilisation: null, boundaryInductanceH: null,
    },
    windings: [],
    leakages: [],
    layout,
    losses: { corner: 'minimum-input', copperW: null, coreW: null, totalW: null, coreDensityWPerM3: null, model: '' },
    thermal: { riseK: null, ambientC: null, windingC: null, limitC: null, marginK: null, surfaceMm2: null, model: '' },
    boundaries: specification.insulation.boundaries.map(boundaryResult),
    mass: { copperG: null, coreG: null, totalG: null },
    findings: [],
    checks: [],
    working: {},
  }
}
