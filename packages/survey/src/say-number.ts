/** Numbers as a sentence has them. */

/** "12.4°", "0.25°", "179.99°". */
export function sayDegrees(value: number): string {
  return `${sayNumber(value)}°`;
}

/** "1,853 deg/s". */
export function sayRate(value: number): string {
  return `${sayNumber(value)} deg/s`;
}

/** "0.033 s". */
export function saySeconds(value: number): string {
  return `${Math.abs(value) >= 0.001 || value === 0 ? value.toFixed(3) : Number(value.toPrecision(2))} s`;
}

/** As many decimals as the size needs: none from 1,000 up, one from 1 up, two figures below; more where 180 would hide them. */
function sayNumber(value: number): string {
  const size = Math.abs(value);
  if (size >= 1000) return value.toLocaleString('en-GB', { maximumFractionDigits: 0 });
  if (size >= 1 || size === 0) return value.toFixed(1);
  return String(Number(value.toPrecision(2)));
}
