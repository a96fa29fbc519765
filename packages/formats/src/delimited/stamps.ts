import type { TimePower } from './column-name.js';

/** The stamps of a table as seconds. */
export interface Stamps {
  readonly seconds: Float64Array;
  /** Whole seconds that were taken off every stamp; 0 where float64 holds the stamps as they are. */
  readonly epoch: bigint;
  /** Most decimal places of a second that a stamp was written to. */
  readonly decimals: number;
}

/** Takes the stamps one by one, as text. */
export interface StampReader {
  /** False where the text is no number. */
  add(text: string): boolean;
  done(): Stamps;
}

// One way to match each text: a long one that fails, fails at once.
const NUMBER = /^([+-]?)(\d*)(?:\.(\d*))?(?:[eE]([+-]?\d{1,4}))?$/;
const NO_STAMP = /^[+-]?(?:nan|inf|infinity)$/i;
/** Digits that float64 keeps whatever they are. */
const SAFE_DIGITS = 15;
/** Powers beyond this are no times; without a bound, one number would make a BigInt of any length. */
const LARGEST_POWER = 300;

/** `units` times ten to `exponent`, seconds. */
interface Exact {
  readonly units: bigint;
  readonly exponent: number;
}

/**
 * Reads stamps without loss. A stamp that is more than 2^53 of its own last places can't be a float64 (nanoseconds since 1970 are
 * 1.7e18). Where any is, every stamp is read as seconds after the whole second that the first one lies in. The subtraction is done
 * on whole numbers, so that differences of stamps are as exact as float64 of small seconds is.
 */
export function stampReader(power: TimePower): StampReader {
  const stamps: (number | Exact)[] = [];
  let long = false;
  let decimals = 0;
  return {
    add(text) {
      const read = exactly(text, power);
      if (!read) {
        if (!NO_STAMP.test(text)) return false;
        stamps.push(NaN);
        return true;
      }
      decimals = Math.max(decimals, -read.exponent);
      const beyond = text.length > SAFE_DIGITS && isBeyond(read.units);
      long ||= beyond;
      stamps.push(beyond ? read : Number(`${read.units}e${read.exponent}`));
      return true;
    },
    done() {
      const epoch = long ? epochOf(stamps) : 0n;
      return { seconds: Float64Array.from(stamps, (stamp) => secondsAfter(epoch, stamp)), epoch, decimals };
    },
  };
}

function isBeyond(units: bigint): boolean {
  const size = units < 0n ? -units : units;
  return size > BigInt(Number.MAX_SAFE_INTEGER);
}

/** The whole second that the first stamp lies in. */
function epochOf(stamps: readonly (number | Exact)[]): bigint {
  const first = stamps.find((stamp) => typeof stamp !== 'number' || Number.isFinite(stamp));
  if (first === undefined) return 0n;
  if (typeof first === 'number') return BigInt(Math.floor(first));
  const { units, exponent } = first;
  if (exponent >= 0) return units * 10n ** BigInt(exponent);
  const second = 10n ** BigInt(-exponent);
  const whole = units / second;
  return units < whole * second ? whole - 1n : whole;
}

/** The nearest float64 to the stamp's seconds after `epoch`. */
function secondsAfter(epoch: bigint, stamp: number | Exact): number {
  // A number of at most 15 digits is spelled by JavaScript as the file spelled it.
  const exact = typeof stamp === 'number' ? exactly(String(stamp), 0) : stamp;
  if (!exact) return NaN;
  const { units, exponent } = exact;
  if (exponent >= 0) return Number(units * 10n ** BigInt(exponent) - epoch);
  return Number(`${units - epoch * 10n ** BigInt(-exponent)}e${exponent}`);
}

function exactly(text: string, power: TimePower): Exact | undefined {
  const [, sign, whole = '', fraction = '', exponent = '0'] = NUMBER.exec(text) ?? [];
  if (sign === undefined || whole + fraction === '' || whole.length + fraction.length > LARGEST_POWER)
    return undefined;
  if (Math.abs(Number(exponent)) > LARGEST_POWER) return undefined;
  const units = BigInt(whole + fraction);
  return { units: sign === '-' ? -units : units, exponent: Number(exponent) - fraction.length + power };
}
