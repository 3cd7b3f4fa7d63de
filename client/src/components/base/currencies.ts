/** Currency codes of ISO 4217 that the browser knows, those of this trade first. */
const USUAL = ['EUR', 'USD', 'GBP', 'CHF', 'CNY', 'JPY', 'SEK', 'NOK', 'DKK', 'PLN', 'CZK', 'HUF', 'INR', 'TWD']
const names = new Intl.DisplayNames('en', { type: 'currency' })

export const CURRENCIES = [...new Set([...USUAL, ...Intl.supportedValuesOf('currency')])].map((code) => ({
  code,
  label: `${code} ${names.of(code)}`,
}))
