import { expect, it } from 'vitest'
import { Decimal } from '#shared/money'
import { medianOf, priceOutliers } from './outliers'

it('flags a price that is seven times the others, and one that is far below', () => {
  expect(priceOutliers(['1.3', '9.85', '1.2', '0.6', '1.25'])).toEqual([
    null,
    { ratio: '7.88', side: 'above' },
    null,
    { ratio: '0.48', side: 'below' },
    null,
  ])
})

it('does not flag what is exactly 40 % away', () => {
  expect(priceOutliers(['1', '1.4', '0.6'])).toEqual([null, null, null])
})

it('judges nothing by two prices, and leaves missing ones alone', () => {
  expect(priceOutliers(['1', '9', null])).toEqual([null, null, null])
})

it('takes the mean of the middle two', () => {
  expect(medianOf(['4', '1', '2', '3'].map((v) => new Decimal(v)))?.toString()).toBe('2.5')
  expect(medianOf([])).toBeNull()
})
