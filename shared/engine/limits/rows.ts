import type { Characteristic, TestRow } from '../specification'
import { ENGINE_VERSION } from '../version'

/** A row with everything but what its characteristic decides. */
export const testRow = (characteristic: Characteristic, symbol: string, unit: TestRow['unit'], of: Partial<TestRow>): TestRow => ({
  id: '',
  status: 'mandatory',
  origin: { kind: 'proposed', engine: ENGINE_VERSION },
  number: 0,
  characteristic,
  symbol,
  windingId: null,
  boundaryId: null,
  drivenTerminals: [],
  shortedTerminals: [],
  openTerminals: [],
  method: '',
  instrumentClass: '',
  frequencyHz: null,
  levelV: null,
  biasA: null,
  temperatureC: 25,
  minimum: null,
  nominal: null,
  maximum: null,
  unit,
  extent: 'every-part',
  acceptableQualityLimit: null,
  criticalToQuality: false,
  reaction: 'Reject the part; stop the lot when a second one fails',
  record: 'reading',
  ...of,
})
