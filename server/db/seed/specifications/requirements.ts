import type { RequirementSheet } from '#shared/engine/specification'

/** Buoy supply: a battery of 18 to 32 V to +5.2 V for the instruments and ±15 V for their sensors, on one return. */
export const BUOY_SUPPLY: RequirementSheet = {
  duty: {
    topology: 'flyback',
    supply: { kind: 'dc', minimumV: 18, nominalV: 24, maximumV: 32 },
    outputs: [
      { id: 'o1', name: '+5.2 V', role: 'main', voltageV: 5.2, rectifierDropV: 0.5, fullLoadCurrentA: 3, lightLoadCurrentA: 0.3, side: 'secondary' },
      { id: 'o2', name: '+15 V', role: 'main', voltageV: 15, rectifierDropV: 0.7, fullLoadCurrentA: 0.4, lightLoadCurrentA: 0.04, side: 'secondary' },
      { id: 'o3', name: '−15 V', role: 'main', voltageV: -15, rectifierDropV: 0.7, fullLoadCurrentA: 0.4, lightLoadCurrentA: 0.04, side: 'secondary' },
    ],
    switchingFrequencyHz: 100e3,
    conduction: { kind: 'continuous', rippleRatio: 0.6 },
    efficiency: 0.82,
    maximumDutyRatio: 0.45,
    reflectedVoltageV: null,
    switchDropV: 0.3,
    currentLimit: { nominalA: 6.2, tolerance: 0.08, delayS: 150e-9 },
    clampSpikeV: 20,
    switchRatingV: 100,
  },
  ambientC: 55,
  permittedRiseK: 45,
  fluxUtilisation: 0.8,
  targetCurrentDensityAPerMm2: 5.5,
  insulationMethod: 'functional',
  maximumHeightMm: null,
}

/** Harbour supply: 100 to 240 V mains to 13.8 V with an auxiliary winding for the controller; reinforced by insulated wire. */
export const HARBOUR_SUPPLY: RequirementSheet = {
  duty: {
    topology: 'flyback',
    supply: { kind: 'mains', minimumV: 85, nominalV: 230, maximumV: 264, lineFrequencyHz: 50, bulkCapacitanceF: 120e-6, conductionTimeS: 3e-3 },
    outputs: [
      { id: 'o1', name: '13.8 V', role: 'main', voltageV: 13.8, rectifierDropV: 0.6, fullLoadCurrentA: 3, lightLoadCurrentA: 0.15, side: 'secondary' },
      { id: 'o2', name: 'Controller supply', role: 'auxiliary', voltageV: 14, rectifierDropV: 0.8, fullLoadCurrentA: 0.03, lightLoadCurrentA: 0.02, side: 'primary' },
    ],
    switchingFrequencyHz: 65e3,
    conduction: { kind: 'continuous', rippleRatio: 0.9 },
    efficiency: 0.86,
    maximumDutyRatio: 0.5,
    reflectedVoltageV: 90,
    switchDropV: 1.5,
    currentLimit: { nominalA: 1.85, tolerance: 0.08, delayS: 200e-9 },
    clampSpikeV: 90,
    switchRatingV: 700,
  },
  ambientC: 50,
  permittedRiseK: 50,
  fluxUtilisation: 0.8,
  targetCurrentDensityAPerMm2: 5.5,
  insulationMethod: 'triple-insulated-wire',
  maximumHeightMm: null,
}

/** 1:1 coupled inductor of a SEPIC that makes 12 V from a vehicle's 9 to 18 V. */
export const COUPLED_INDUCTOR: RequirementSheet = {
  duty: {
    topology: 'coupled-inductor',
    supply: { kind: 'dc', minimumV: 9, nominalV: 12, maximumV: 18 },
    outputVoltageV: 12,
    outputDropV: 0.5,
    outputCurrentA: 1.5,
    ratio: 1,
    switchingFrequencyHz: 200e3,
    rippleRatio: 0.4,
    efficiency: 0.9,
    switchDropV: 0.2,
    currentLimit: { nominalA: 5.5, tolerance: 0.1, delayS: 100e-9 },
  },
  ambientC: 60,
  permittedRiseK: 40,
  fluxUtilisation: 0.8,
  targetCurrentDensityAPerMm2: 6,
  insulationMethod: 'functional',
  maximumHeightMm: 20,
}
