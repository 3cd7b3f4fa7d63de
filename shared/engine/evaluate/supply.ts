import { bulkMaximumV, bulkMinimum } from '../topologies/mains-bulk'
import type { Supply } from '../specification'

/** Direct voltages between which the converter works. */
export interface SupplyRange {
  minimumV: number
  nominalV: number
  maximumV: number
}

export type SupplyAnswer = { state: 'known'; range: SupplyRange } | { state: 'capacitor-too-small'; missingEnergyJ: number }

/**
 * The direct voltages at the converter: as given, or behind a bridge rectifier with its bulk capacitor, where
 * the least is the valley at the least mains voltage and full load.
 *
 * Source: Power Integrations AN-17 (energy balance of the bulk capacitor).
 *
 * @throws RangeError on a value out of its range
 */
export function supplyRange(supply: Supply, inputPowerW: number): SupplyAnswer {
  if (supply.kind === 'dc') return { state: 'known', range: supply }
  const valley = bulkMinimum({
    mainsVoltageV: supply.minimumV,
    mainsFrequencyHz: supply.lineFrequencyHz,
    inputPowerW,
    capacitanceF: supply.bulkCapacitanceF,
    charging: { kind: 'charging-time', chargingTimeS: supply.conductionTimeS },
  })
  if (valley.state !== 'held') return { state: valley.state, missingEnergyJ: valley.missingEnergyJ }
  return { state: 'known', range: { minimumV: valley.minimumV, nominalV: bulkMaximumV(supply.nominalV), maximumV: bulkMaximumV(supply.maximumV) } }
}
