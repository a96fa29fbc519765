/** At most six significant digits, without an exponent for anything a person meets. */
export function sayFigure(value: number): string {
  const digits = Math.abs(value) >= 100 ? 0 : Math.abs(value) >= 10 ? 1 : 2;
  if (value !== 0 && Math.abs(value) < 0.005) return value.toPrecision(2);
  return value.toLocaleString('en-GB', { minimumFractionDigits: digits, maximumFractionDigits: digits });
}
