import type { SquadParts } from '../curve/squad-curve.js';
import type { KeyRates } from '../curve/key-rate.js';
import { splineKeys } from '../curve/spline-keys.js';
import { squadParts } from '../curve/squad-spline.js';
import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import type { RotationTrack } from '../track/rotation-track.js';
import type { Sampler } from './sampler.js';
import { squadPart, squadRecords, writeSquad } from './squad-record.js';
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
  const records = squadRecords(keyed(squadParts(splineKeys(track, options.loop === true), options.rates)));
  const { times } = records.parts;
  const lookup = timeLookup(times);
  const [start, end] = lookup.span;

  function write(t: number, out: NumberStore, at: number): void {
    let segment = 0;
    squadPart[0] = 0;
    if (t >= end) segment = times.length - 1;
    else if (t > start) {
      segment = locate(lookup, t);
      squadPart[0] = (t - times[segment]) / (times[segment + 1] - times[segment]);
    }
    writeSquad(records, segment, out, at);
  }

  return Object.freeze({
    start,
    end,
    sample: <T extends NumberStore>(t: number, out: T): T => {
      write(t, out, 0);
      return out;
    },
    sampleMany: <T extends NumberStore>(asked: ReadonlyNumberStore, out: T): T => {
      for (let n = 0; n < asked.length; n++) write(asked[n], out, 4 * n);
      return out;
    },
  });
}

/** With times of its own, which may be the track's; identity at 0 s where there is no key that can be played. */
function keyed(parts: SquadParts): SquadParts {
  if (parts.times.length > 0) return { ...parts, times: parts.times.slice() };
  return { ...parts, times: new Float64Array(1), keys: Float64Array.of(0, 0, 0, 1) };
}
