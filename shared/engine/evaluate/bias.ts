import { biasFieldAPerM, permeabilityShare } from '../magnetics/bias'
import { attempt, explain, positive, report } from './context'
import type { Context } from './context'
import type { CornerState } from './corner-result'
import { originOf } from './inductance'
import type { InductanceBasis } from './inductance'
import { fullLoadPeakA } from './worst-flux'

export interface BiasResult {
  biasFieldAPerM: number | null
  inductanceUnderBiasH: number | null
}

const NOTHING: BiasResult = { biasFieldAPerM: null, inductanceUnderBiasH: null }

/** A gap spread through the material: its permeability falls with the field, long before saturation. */
const hasDistributedGap = ({ material, specification }: Context) => material?.use === 'powder' || specification.core.gap.position.value === 'distributed'

/** Inductance that is left at the peak current of full load in a core with a distributed gap; null for others, which a gap in one place keeps straight. */
export function biasResult(context: Context, basis: InductanceBasis | null, corners: readonly CornerState[]): BiasResult {
  const { core, material, primary } = context
  if (!basis || !core || !material || !primary || !hasDistributedGap(context)) return NOTHING
  const cornerA = fullLoadPeakA({ corners: corners.map(({ result }) => result) }, primary.id)
  const currentA = cornerA ?? primary.peakCurrentA
  if (!positive(currentA)) return NOTHING
  const field = attempt(context, 'core.core', () => biasFieldAPerM({ turns: primary.turns, currentA, effectiveLengthMm: core.effectiveLengthMm }))
  if (field === null) return NOTHING
  const share = permeabilityShare(material.biasPoints ?? [], field)
  if (share.state !== 'known') report(context, 'no-bias-data', 'warning', 'core.material', { material: material.name, fieldAPerM: field })
  const inductanceUnderBiasH = share.state === 'known' ? basis.nominalH * share.value : null
  explain(context, 'magnetics.biasFieldAPerM', () => ({
    symbol: 'H', value: field, unit: 'A/m', formula: 'N·Î/l_e', source: 'Ampère’s law over the effective length, IEC 60205',
    inputs: [{ name: 'N', value: primary.turns, unit: '', origin: 'windings.turns' }, { name: 'Î', value: currentA, unit: 'A', origin: cornerA === null ? 'as stated for the winding' : 'largest peak of the full-load corners' }, { name: 'l_e', value: core.effectiveLengthMm, unit: 'mm', origin: originOf(context, 'core') }],
  }))
  explain(context, 'magnetics.inductanceUnderBiasH', () => ({
    symbol: 'L(Î)', value: inductanceUnderBiasH, unit: 'H', formula: 'L·µ(H)/µ_i', source: originOf(context, 'material'),
    inputs: [{ name: 'L', value: basis.nominalH, unit: 'H', origin: 'magnetics.inductanceH' }, { name: 'µ(H)/µ_i', value: share.state === 'known' ? share.value : 'not known', unit: '', origin: 'material, bias curve' }],
  }))
  return { biasFieldAPerM: field, inductanceUnderBiasH }
}
