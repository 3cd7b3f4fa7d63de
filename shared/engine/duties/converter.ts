import type { ConverterOutput, CurrentLimit, Supply } from '../specification'

/** What every converter with a switch, a transformer and rectified outputs states. */
export interface ConverterDuty {
  supply: Supply
  /** Output power over input power at full load, 0…1. */
  efficiency: number
  /** Drop of the closed switches in series and their sense resistor at full load. */
  switchDropV: number
  currentLimit: CurrentLimit | null
  /** Turn-off spike above the ideal voltage of the open switch, as its clamp holds it; null when not known. */
  clampSpikeV: number | null
  /** Rated voltage of the switch; null when not known. */
  switchRatingV: number | null
}

/** An output behind an inductor, as every converter of the buck family has it. */
export interface FilteredOutput extends ConverterOutput {
  /** Inductor of this output's filter, H; null derives it from the ripple. */
  filterInductanceH: number | null
  /** ΔI peak-to-peak over the full-load current at maximum input; counts where no inductance is given. */
  rippleRatio: number
}

/** Two half windings with a rectifier each, or one winding with a bridge of four. */
export type RectifierForm = 'centre-tapped' | 'full-wave'

/** Converters that transfer energy while the switch conducts, with an inductor in every output. */
export interface ForcedDuty extends ConverterDuty {
  /** Periods of the core's flux per second. */
  switchingFrequencyHz: number
  /** Longest conduction of one switch over the period, as the controller allows it; at most 0.5 where two sides take turns. */
  maximumDutyRatio: number
}
