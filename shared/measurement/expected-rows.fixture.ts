import type { ExpectedRow } from './model'

const row = (id: string, values: Partial<ExpectedRow> & Pick<ExpectedRow, 'symbol' | 'characteristic' | 'unit'>): ExpectedRow => ({
  id,
  minimum: null,
  nominal: null,
  maximum: null,
  levelV: null,
  temperatureC: 20,
  extent: 'every-part',
  record: 'reading',
  ...values,
})

/** A flyback transformer's usual test rows. */
export const ROWS: ExpectedRow[] = [
  row('t1', { symbol: 'Lp', characteristic: 'inductance', unit: 'H', minimum: 540e-6, nominal: 600e-6, maximum: 660e-6 }),
  row('t2', { symbol: 'Llk', characteristic: 'leakage', unit: 'H', maximum: 12e-6 }),
  row('t3', { symbol: 'Rdc P', characteristic: 'dc-resistance', unit: 'Ω', maximum: 0.95 }),
  row('t4', { symbol: 'Rdc S1', characteristic: 'dc-resistance', unit: 'Ω', maximum: 0.035 }),
  row('t5', { symbol: 'P:S1', characteristic: 'turns-ratio', unit: '1', minimum: 9.9, nominal: 10, maximum: 10.1 }),
  row('t6', { symbol: 'HV P–S', characteristic: 'hipot', unit: 'V', levelV: 3000, record: 'pass-fail' }),
  row('t7', { symbol: 'IR', characteristic: 'insulation-resistance', unit: 'Ω', minimum: 100e6 }),
]

export const rowOf = (symbol: string): ExpectedRow => ROWS.find((each) => each.symbol === symbol)!
