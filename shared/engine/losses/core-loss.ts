import { known, notCheckable } from '../answer'
import type { Answer } from '../answer'
import type { Finding, FindingCode } from '../findings'
import { requireNotNegative, requirePositive } from '../require'
import { maximum, minimum, peakToPeak } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'
import { gamma } from './gamma'
import { hysteresisLoops } from './minor-loops'

/** P = k·f^α·B^β in W/m³, f in Hz, B the peak flux density in T of a sine. */
export interface SteinmetzCoefficients {
  k: number
  alpha: number
  beta: number
}

export type Range = readonly [lowest: number, highest: number]

/** One fit of a grade's loss with the range in which it holds. */
export interface CoreLossFit extends SteinmetzCoefficients {
  /** Factor of temperature, ct0 − ct1·T + ct2·T² with T in °C; 1 without it. */
  temperature?: { ct0: number; ct1: number; ct2: number }
  frequencyRangeHz: Range
  /** Peak flux density. */
  fluxRangeT?: Range
  temperatureRangeC?: Range
  source: string
}

function checkCoefficients({ k, alpha, beta }: SteinmetzCoefficients): void {
  requirePositive('k', k)
  requirePositive('alpha', alpha)
  requirePositive('beta', beta)
}

/**
 * Loss density of a sine, in W/m³.
 *
 * Source: C. Steinmetz, Trans. AIEE 9 (1892) 3, in its form with frequency.
 *
 * @throws RangeError unless coefficients and frequency are positive and the flux density is not negative
 */
export function steinmetzLossWPerM3(coefficients: SteinmetzCoefficients, input: { frequencyHz: number; peakFluxDensityT: number }): number {
  checkCoefficients(coefficients)
  requirePositive('frequencyHz', input.frequencyHz)
  requireNotNegative('peakFluxDensityT', input.peakFluxDensityT)
  return coefficients.k * input.frequencyHz ** coefficients.alpha * input.peakFluxDensityT ** coefficients.beta
}

/** ∫ |cos θ|^α dθ over a full turn, 2·√π·Γ((α + 1)/2)/Γ(α/2 + 1). Source: beta integral. */
const cosinePowerIntegral = (alpha: number) => (2 * Math.sqrt(Math.PI) * gamma((alpha + 1) / 2)) / gamma(alpha / 2 + 1)

const igseDivisor = (alpha: number, beta: number) => (2 * Math.PI) ** (alpha - 1) * 2 ** (beta - alpha) * cosinePowerIntegral(alpha)

/**
 * Coefficient k_i = k/((2π)^(α−1)·2^(β−α)·∫|cos θ|^α dθ) of the improved generalised Steinmetz equation, exact.
 *
 * Source: K. Venkatachalam et al., IEEE COMPEL 2002.
 *
 * @throws RangeError unless all coefficients are positive
 */
export function igseCoefficient(coefficients: SteinmetzCoefficients): number {
  checkCoefficients(coefficients)
  return coefficients.k / igseDivisor(coefficients.alpha, coefficients.beta)
}

/** The Steinmetz k of a set that is published with k_i, the inverse of `igseCoefficient`. @throws RangeError unless all are positive */
export function steinmetzFromIgse({ ki, alpha, beta }: { ki: number; alpha: number; beta: number }): SteinmetzCoefficients {
  requirePositive('ki', ki)
  return { k: ki * igseDivisor(alpha, beta), alpha, beta }
}

/**
 * Loss density of a piecewise-linear flux density, in W/m³, each of its hysteresis loops by its own swing:
 *
 *     P = k_i·(1/T)·Σ_loops ΔB^(β−α)·Σ |dB/dt|^α·Δt
 *
 * A dc bias has no influence in this model.
 * Source: K. Venkatachalam et al., IEEE COMPEL 2002.
 *
 * @throws RangeError unless all coefficients are positive
 */
export function igseLossWPerM3(coefficients: SteinmetzCoefficients, fluxDensityT: Waveform): number {
  const { alpha, beta } = coefficients
  const ki = igseCoefficient(coefficients)
  const sum = hysteresisLoops(fluxDensityT).reduce((total, { swingT, pieces }) => {
    if (!(swingT > 0)) return total
    const rates = pieces.reduce((of, { durationS, from, to }) => of + (durationS > 0 ? Math.abs((to - from) / durationS) ** alpha * durationS : 0), 0)
    return total + swingT ** (beta - alpha) * rates
  }, 0)
  return (ki * sum) / fluxDensityT.periodS
}

/** Factor of temperature of a fit, 1 where it has none. Source: Ferroxcube, Design of Planar Power Transformers. */
export function coreLossTemperatureFactor({ temperature }: Pick<CoreLossFit, 'temperature'>, temperatureC: number): number {
  if (!temperature) return 1
  return temperature.ct0 - temperature.ct1 * temperatureC + temperature.ct2 * temperatureC ** 2
}

export interface CoreLossInput {
  fits: readonly CoreLossFit[]
  fluxDensityT: Waveform
  temperatureC: number
  /** Dotted path of the core material in the specification, for the findings. */
  path: string
}

export interface CoreLoss {
  model: 'improved-generalised-steinmetz'
  lossWPerM3: number
  fit: CoreLossFit
  findings: Finding[]
}

/**
 * Core loss density by the fit whose frequency range holds the flux's fundamental (else the nearest, with a finding),
 * corrected for temperature. Without any fit it is not checkable.
 *
 * Source: as `igseLossWPerM3`, and the fit's own.
 *
 * @throws RangeError as `igseLossWPerM3`
 */
export function coreLoss({ fits, fluxDensityT, temperatureC, path }: CoreLossInput): Answer<CoreLoss> {
  const frequencyHz = 1 / fluxDensityT.periodS
  const fit = nearestFit(fits, frequencyHz)
  if (!fit) return notCheckable('no-data')
  const peakT = peakToPeak(fluxDensityT) / 2
  const finding = (code: FindingCode, range: Range | undefined, unit: string, value: number): Finding[] =>
    !range || within(range, value) ? [] : [{ code, severity: 'warning', path, values: { [`actual${unit}`]: value, [`lowest${unit}`]: range[0], [`highest${unit}`]: range[1] } }]
  return known({
    model: 'improved-generalised-steinmetz',
    lossWPerM3: igseLossWPerM3(fit, fluxDensityT) * coreLossTemperatureFactor(fit, temperatureC),
    fit,
    findings: [
      ...finding('core-loss-frequency-out-of-range', fit.frequencyRangeHz, 'Hz', frequencyHz),
      ...finding('core-loss-flux-out-of-range', fit.fluxRangeT, 'T', peakT),
      ...finding('core-loss-temperature-out-of-range', fit.temperatureRangeC, 'C', temperatureC),
      ...biasFinding(fluxDensityT, path),
    ],
  })
}

/** Below this a flux that does not return to zero is no bias worth a word, T. */
const LEAST_BIAS_T = 0.03

/** Fits are measured about zero: where the flux never comes back there, the true loss is higher. Source: common practice. */
function biasFinding(fluxDensityT: Waveform, path: string): Finding[] {
  const biasT = Math.max(minimum(fluxDensityT), -maximum(fluxDensityT))
  return biasT > LEAST_BIAS_T ? [{ code: 'core-loss-under-bias', severity: 'note', path, values: { biasT } }] : []
}

// A period written as 1/f need not give f back to the last digit.
const within = ([lowest, highest]: Range, value: number) => value >= lowest * (1 - 1e-9) && value <= highest * (1 + 1e-9)

function nearestFit(fits: readonly CoreLossFit[], frequencyHz: number): CoreLossFit | undefined {
  const distance = ({ frequencyRangeHz: [low, high] }: CoreLossFit) =>
    Math.max(Math.log(low / frequencyHz), Math.log(frequencyHz / high), -1e-9)
  return [...fits].sort((a, b) => distance(a) - distance(b))[0]
}
