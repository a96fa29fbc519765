import type { KeyRates } from '../curve/key-rate.js';
import { splineKeys } from '../curve/spline-keys.js';
import { squadParts } from '../curve/squad-spline.js';
import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import type { RotationTrack } from '../track/rotation-track.js';
import type { Sampler } from './sampler.js';
import { SQUAD_RECORD, squadRecords, writeSquad } from './squad-record.js';
import { timeLookup, locate } from './time-lookup.js';

/** How the squad through the keys is made; as `rotationSpline` takes it. */
export interface SquadSamplerOptions {
  readonly rates: KeyRates;
  /** The last key is the first again. Default false. */
  readonly loop?: boolean;
}

/**
 * Compiles the spherical quadrangles of `rotationSpline` (kind `squad`) through the keys of one track; the interpolation that the
 * track states is not looked at. Within 1e-13 degrees of that curve, and nothing is allocated in a call. The track is copied.
 */
export function squadSampler(track: RotationTrack, options: SquadSamplerOptions): Sampler {
  const parts = squadParts(splineKeys(track, options.loop === true), options.rates);
  const count = Math.max(1, parts.times.length);
  const records = squadRecords(parts);
  const lookup = timeLookup(records, SQUAD_RECORD, SQUAD_RECORD - 1, count);
  const [start, end] = lookup.span;
  const last = (count - 1) * SQUAD_RECORD;

  function write(t: number, out: NumberStore, at: number): void {
    if (!(t > start)) return writeSquad(records, 0, 0, out, at);
    if (t >= end) return writeSquad(records, last, 0, out, at);
    const from = locate(lookup, t) * SQUAD_RECORD;
    const t0 = records[from + SQUAD_RECORD - 1];
    writeSquad(records, from, (t - t0) / (records[from + 2 * SQUAD_RECORD - 1] - t0), out, at);
  }

  return Object.freeze({
    start,
    end,
    sample: <T extends NumberStore>(t: number, out: T): T => {
      write(t, out, 0);
      return out;
    },
    sampleMany: <T extends NumberStore>(times: ReadonlyNumberStore, out: T): T => {
      for (let n = 0; n < times.length; n++) write(times[n], out, 4 * n);
      return out;
    },
  });
}
