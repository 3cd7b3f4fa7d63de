import { isFailWord, isPassWord } from './words'

export interface WithstandText {
  voltageV: number | null
  timeS: number | null
  currentA: number | null
  passed: boolean
}

const FIGURE = String.raw`(\d+(?:[.,]\d+)?)\s*`
const VOLTAGE = new RegExp(`${FIGURE}(k?V)\\s*(?:a\\.?c\\.?|d\\.?c\\.?|rms)*`, 'i')
const TIME = new RegExp(`${FIGURE}(ms|s|sec|min)(?![a-z])`, 'i')
const CURRENT = new RegExp(`${FIGURE}([mµu]?A)(?![a-z])`)

const VOLTS: Readonly<Record<string, number>> = { v: 1, kv: 1e3 }
const SECONDS: Readonly<Record<string, number>> = { ms: 1e-3, s: 1, sec: 1, min: 60 }
const AMPERES: Readonly<Record<string, number>> = { A: 1, mA: 1e-3, µA: 1e-6, uA: 1e-6 }

function take(text: string, pattern: RegExp, factors: Readonly<Record<string, number>>, fold: (unit: string) => string): { value: number | null; rest: string } {
  const match = pattern.exec(text)
  if (!match) return { value: null, rest: text }
  const factor = factors[fold(match[2]!)]!
  return { value: Number(match[1]!.replace(',', '.')) * factor, rest: text.replace(match[0], ' ') }
}

/**
 * Reads what a withstand tester prints in one cell, `3000VAC 2s OK 0.12mA`: voltage, time, leakage current
 * and the verdict, in any order. Null without a plain verdict or when anything is left over.
 */
export function readWithstand(text: string): WithstandText | null {
  const source = text.normalize('NFKC').replace(/μ/g, 'µ')
  const voltage = take(source, VOLTAGE, VOLTS, (unit) => unit.toLowerCase())
  const time = take(voltage.rest, TIME, SECONDS, (unit) => unit.toLowerCase())
  const current = take(time.rest, CURRENT, AMPERES, (unit) => unit)
  const word = current.rest.replace(/[\s,;/|@=]+/g, ' ').trim()
  const passed = isPassWord(word) ? true : isFailWord(word) ? false : null
  if (passed === null) return null
  return { voltageV: voltage.value, timeS: time.value, currentA: current.value, passed }
}
