/**
 * A measured number rounded to 6 significant digits, so that the same file gives the same report on every machine. Times are never
 * rounded.
 */
export function significant(value: number): number {
  return Number.isFinite(value) ? Number(value.toPrecision(6)) : value;
}
