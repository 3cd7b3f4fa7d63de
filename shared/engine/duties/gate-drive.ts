import type { DcSupply, Side } from '../specification'

/** A winding that drives one gate. */
export interface GateOutput {
  id: string
  name: string
  side: Side
  /** Step of the gate's voltage; the ratio follows from it and the nominal driver voltage. */
  gateVoltageV: number
  /** For that step. */
  gateChargeC: number
}

export interface GateDriveDuty {
  topology: 'gate-drive'
  /** `bipolar`: pulses of either sign in turn; `unipolar-dc-restored`: one pulse behind a series capacitor. */
  drive: 'bipolar' | 'unipolar-dc-restored'
  /** Voltage of the driver. */
  supply: DcSupply
  switchingFrequencyHz: number
  /** Length of a pulse over the period; at most 0.5 of a bipolar drive. */
  dutyRatio: { minimum: number; maximum: number }
  outputs: GateOutput[]
  driverResistanceOhm: number
  /** In series with the primary; null without. */
  couplingCapacitanceF: number | null
  /** In which a gate is charged. */
  transitionS: number
  /** Peak of the magnetising current that the driver may carry. */
  magnetisingCurrentA: number
}
