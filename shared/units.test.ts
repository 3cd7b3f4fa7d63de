import { describe, expect, it } from 'vitest'
import {
  aPerMToOersted, celsiusToKelvin, circularMilToMm2, degrees, gaussToTesla, inchToMm, kelvinToCelsius, mm2ToCircularMil, mmToInch,
  oerstedToAPerM, teslaToGauss, toDegrees, toRadians,
} from './units'

describe('conversions', () => {
  it.each([
    { name: '1 in is 25.4 mm', got: inchToMm(1), want: 25.4 },
    { name: '1 Oe is 79.577 A/m', got: oerstedToAPerM(1), want: 79.57747154594767 },
    { name: '10 kG is 1 T', got: gaussToTesla(10_000), want: 1 },
    { name: '1000 circular mils are 0.50671 mm²', got: circularMilToMm2(1000), want: 0.506707479 },
    { name: '25 °C is 298.15 K', got: celsiusToKelvin(25), want: 298.15 },
    { name: '180° is π', got: toRadians(degrees(180)), want: Math.PI },
  ])('$name', ({ got, want }) => expect(got).toBeCloseTo(want, 9))

  it.each([
    { name: 'inch', there: mmToInch, back: inchToMm },
    { name: 'oersted', there: aPerMToOersted, back: oerstedToAPerM },
    { name: 'gauss', there: teslaToGauss, back: gaussToTesla },
    { name: 'circular mil', there: mm2ToCircularMil, back: circularMilToMm2 },
    { name: 'kelvin', there: celsiusToKelvin, back: kelvinToCelsius },
  ])('$name goes there and back', ({ there, back }) => expect(back(there(3.7))).toBeCloseTo(3.7, 12))

  it('turns degrees there and back', () => expect(toDegrees(toRadians(degrees(37)))).toBeCloseTo(37, 12))
})
