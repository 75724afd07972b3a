import { currencyExponent } from './money';

/** Minor units as bare figures with the currency's point, as they are typed and written to files: `1234.50`, `980`, `3.125`. */
export function moneyFigures(minor: number, currency: string): string {
  const exponent = currencyExponent(currency);
  const digits = String(Math.abs(minor)).padStart(exponent + 1, '0');
  const figures =
    exponent === 0 ? digits : `${digits.slice(0, -exponent)}.${digits.slice(-exponent)}`;
  return minor < 0 ? `-${figures}` : figures;
}
