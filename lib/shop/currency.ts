/** Decimal places of a currency's amounts (ISO 4217, by Intl): 2 for USD, 0 for JPY, 3 for KWD. */
export const currencyPlaces = (currency: string): number =>
  new Intl.NumberFormat('en-GB', { style: 'currency', currency }).resolvedOptions()
    .maximumFractionDigits ?? 2

/** Minor units in words of the currency: `135.00 USD`; yen and the like without decimals. */
export function moneyWords(minor: number, currency: string): string {
  const places = currencyPlaces(currency)
  const whole = (minor / 10 ** places).toLocaleString('en-GB', {
    minimumFractionDigits: places,
    maximumFractionDigits: places,
  })
  return `${whole.replace('-', '−')} ${currency}`
}
