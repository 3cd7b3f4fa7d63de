import type { Evaluation } from '#shared/engine/evaluation'

type Corner = Evaluation['corners'][number]

export const MODE_WORDS: Readonly<Record<Corner['mode'], string>> = {
  'discontinuous': 'discontinuous',
  'boundary': 'boundary',
  'continuous': 'continuous',
  'forced': 'forced current',
  'below-resonance': 'below resonance',
  'at-resonance': 'at resonance',
  'above-resonance': 'above resonance',
}

/** Figures that only some topologies have, by their permanent code; a code without words shows as it stands. */
const FIGURE_WORDS: Readonly<Record<string, string>> = {
  'boundary-inductance': 'Inductance at the boundary of continuous conduction',
  'reset-share': 'Share of the period for reset',
  'magnetising-peak': 'Magnetising current, peak',
  'gain': 'Gain of the tank',
  'first-harmonic-gain': 'Gain by the first harmonic (approximation)',
  'series-resonance': 'Series resonance',
  'turn-off-current': 'Current at turn-off',
  'zero-voltage-charge': 'Charge to switch at zero voltage',
  'zero-voltage-margin': 'Charge available over charge needed',
}

export const figureWord = (code: string): string => FIGURE_WORDS[code] ?? code.replaceAll('-', ' ')

export interface CircuitRow {
  label: string
  unit: string
  /** One value and the place of its working per corner. */
  cells: { value: number | null; why: string }[]
}

const rows = <T>(corners: readonly Corner[], of: (corner: Corner) => readonly T[] | undefined, make: (one: T, index: number) => readonly { label: string; unit: string; value: number | null; field: string }[], base: string): CircuitRow[] => {
  const first = corners.find((corner) => (of(corner)?.length ?? 0) > 0)
  return (first ? of(first)! : []).flatMap((sample, index) =>
    make(sample, index).map(({ label, unit, field }, position) => ({
      label,
      unit,
      cells: corners.map((corner, place) => {
        const own = of(corner)?.[index]
        return { value: own === undefined ? null : (make(own, index)[position]?.value ?? null), why: `corners.${place}.${base}.${index}${field}` }
      }),
    })))
}

/** What the circuit gives beside the windings: outputs, rectifiers and the topology's own figures, one column per working point. */
export function circuitRows({ corners }: Evaluation, outputName: (id: string) => string): CircuitRow[] {
  const all: CircuitRow[] = [{ label: 'Frequency', unit: 'Hz', cells: corners.map(({ frequencyHz }, place) => ({ value: frequencyHz, why: `corners.${place}.frequencyHz` })) }]
  const commutation: CircuitRow = { label: 'Commutation at an edge', unit: 's', cells: corners.map(({ commutationS }, place) => ({ value: commutationS, why: `corners.${place}.commutationS` })) }
  return [
    ...all,
    ...rows(corners, ({ outputs }) => outputs, ({ outputId, voltageV, rippleA, capacitorRmsA, rippleChargeC }) => [
      { label: `${outputName(outputId)}: voltage`, unit: 'V', value: voltageV, field: '.voltageV' },
      { label: `${outputName(outputId)}: ripple current`, unit: 'A', value: rippleA, field: '.rippleA' },
      { label: `${outputName(outputId)}: capacitor, rms`, unit: 'A', value: capacitorRmsA, field: '.capacitorRmsA' },
      { label: `${outputName(outputId)}: charge of the ripple`, unit: 'C', value: rippleChargeC, field: '.rippleChargeC' },
    ], 'outputs'),
    ...rows(corners, ({ rectifiers }) => rectifiers, ({ outputId, reversePeakV }) => [{ label: `${outputName(outputId)}: rectifier, reverse`, unit: 'V', value: reversePeakV, field: '.reversePeakV' }], 'rectifiers'),
    ...(commutation.cells.some(({ value }) => value !== null && value !== undefined) ? [commutation] : []),
    ...rows(corners, ({ figures }) => figures, ({ code, unit, value }) => [{ label: figureWord(code), unit, value, field: '' }], 'figures'),
  ]
}
