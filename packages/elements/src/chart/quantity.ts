import { sayTime as timeText, type TimeForm } from '@slewcurve/core';

/** Numbers as people read them on the page: always with a unit, minus as a true minus sign, thousands apart. */

const DEGREES = 180 / Math.PI;

/** Radians to degrees (or rad/s to deg/s). */
export function toDegrees(radians: number): number {
  return radians * DEGREES;
}

// Making one costs a hundred times what using it does.
const WRITERS = Array.from(
  { length: 8 },
  (_, places) => new Intl.NumberFormat('en', { maximumFractionDigits: places }),
);

/** A number to `digits` significant digits, whole digits kept, thousands apart by commas; "none" where it is not finite. */
export function sayNumber(value: number, digits = 3): string {
  if (!Number.isFinite(value)) return 'none';
  const size = Math.abs(value);
  if (size !== 0 && size < 5e-7) return value < 0 ? '−0.000001 or less' : 'below 0.000001';
  const whole = size === 0 ? 1 : Math.floor(Math.log10(size)) + 1;
  const places = Math.min(7, Math.max(0, digits - Math.max(whole, size < 1 ? whole : 1)));
  const text = WRITERS[places].format(size);
  return value < 0 && Number(text.replaceAll(',', '')) !== 0 ? `−${text}` : text;
}

/** deg/s: "2,022 deg/s". */
export function sayRate(rate: number, digits = 3): string {
  return `${sayNumber(rate, digits)} deg/s`;
}

/** Degrees: "12.4°". */
export function sayAngle(angle: number, digits = 3): string {
  return `${sayNumber(angle, digits)}°`;
}

/** The clock that all times of a page are read by: one switch for all of them. */
let clock: { readonly form: TimeForm; readonly frameRate: number | undefined } = {
  form: 'seconds',
  frameRate: undefined,
};

/** Lets `sayTime` write times as seconds, frames or timecode from now on. Frames per second that are not known leave seconds. */
export function readTimesAs(form: TimeForm = 'seconds', frameRate?: number): void {
  clock = { form, frameRate };
}

/** A time by the page's clock: to the millisecond "0.633 s", fewer places by `places`; or "frame 19", "00:00:00:19". */
export function sayTime(seconds: number, places = 3): string {
  if (!Number.isFinite(seconds)) return 'none';
  if (clock.form !== 'seconds' && clock.frameRate !== undefined)
    return timeText(seconds, clock.form, clock.frameRate).replace('-', '−');
  const text = Math.abs(seconds).toFixed(places);
  return `${seconds < 0 && Number(text) !== 0 ? '−' : ''}${text} s`;
}

/** A length of time in the unit that suits it: "33.3 ms", "12.0 s". */
export function saySpan(seconds: number): string {
  return Math.abs(seconds) < 1 ? `${sayNumber(seconds * 1000)} ms` : `${sayNumber(seconds)} s`;
}

/** "1 warning", "2 warnings", "no warnings". */
export function sayCount(count: number, one: string, many: string = `${one}s`): string {
  if (count === 0) return `no ${many}`;
  return `${count.toLocaleString('en')} ${count === 1 ? one : many}`;
}

/** "a", "a and b", "a, b and c". */
export function sayList(items: readonly string[]): string {
  if (items.length < 2) return items.join('');
  return `${items.slice(0, -1).join(', ')} and ${items[items.length - 1]}`;
}
