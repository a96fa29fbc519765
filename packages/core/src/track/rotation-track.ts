import { SlewcurveError } from '../errors.js';
import { eulerSequence } from '../quaternion/euler/euler-sequence.js';
import { EXACT_STORAGE, type Storage } from './storage.js';

/** How the file says its keys are joined. STEP, LINEAR and CUBICSPLINE are glTF 2.0's; EULER joins angles as numbers. */
export type Interpolation = 'STEP' | 'LINEAR' | 'CUBICSPLINE' | 'EULER';

/** Numbers that one key takes in `values`. CUBICSPLINE keeps in-tangent, value, out-tangent (tangents per second). */
export const VALUES_PER_KEY: Readonly<Record<Interpolation, number>> = Object.freeze({
  STEP: 4,
  LINEAR: 4,
  CUBICSPLINE: 12,
  EULER: 3,
});

/** What keeps stored matrices from being a turn and a scale, a number each key as the file has it. */
export interface MatrixFlaws {
  /** 1 where a matrix turns a right hand into a left. */
  readonly reflected: Uint8Array;
  /** Largest cosine between two columns; 0 where they are square. */
  readonly shear: Float64Array;
}

/** Where a track came from, in the file's own numbering. */
export interface TrackSource {
  readonly clip: string;
  readonly clipIndex: number;
  readonly node: number;
  readonly sampler?: number;
  readonly channel?: number;
  /** Accessors (or columns) that hold times and values. */
  readonly times?: number;
  readonly values?: number;
  /** Where the file stores matrices. */
  readonly matrices?: MatrixFlaws;
  /** JSON pointers of everything else that reads the same times or values. */
  readonly sharedWith: readonly string[];
}

/**
 * A list of orientations at times: plain data. A function that changes a track returns a new one and shares what it did not
 * touch; nobody writes into `times` or `values` of a track that they did not make.
 */
export interface RotationTrack {
  /** Node path by name (see `SceneNode.path`). Unique within a clip. */
  readonly id: string;
  readonly clip: string;
  /** Seconds, as stored, never shifted. */
  readonly times: Float64Array;
  /** `VALUES_PER_KEY[interpolation]` numbers a key: `[x, y, z, w]`, own to parent; EULER: radians in the order of `sequence`. */
  readonly values: Float64Array;
  readonly interpolation: Interpolation;
  /** EULER alone: upper case intrinsic, lower case extrinsic. */
  readonly sequence?: string;
  /** Keys after which nothing is interpolated: declared cuts, holes of a capture. Ascending. */
  readonly breaks: readonly number[];
  readonly storage: Storage;
  readonly source: TrackSource;
}

/** What `rotationTrack` needs; everything but `times` and `values` has a default. */
export interface RotationTrackInput {
  readonly times: ArrayLike<number>;
  readonly values: ArrayLike<number>;
  /** Default LINEAR. */
  readonly interpolation?: Interpolation;
  readonly sequence?: string;
  readonly id?: string;
  readonly clip?: string;
  readonly breaks?: readonly number[];
  readonly storage?: Storage;
  readonly source?: TrackSource;
}

const NOWHERE: TrackSource = Object.freeze({
  clip: '',
  clipIndex: 0,
  node: -1,
  sharedWith: Object.freeze([]),
});

/**
 * A track as a file stores it: the shape is checked (lengths, interpolation, breaks), the numbers are kept, faulty ones too, so
 * that rules can report them.
 *
 * @throws SlewcurveError `track.bad-length`, `track.unknown-interpolation`, `track.bad-break`, `euler.unknown-sequence`
 */
export function storedTrack(input: RotationTrackInput): RotationTrack {
  const { interpolation = 'LINEAR', id = '', clip = '', breaks = [] } = input;
  const place = { track: id, clip };
  if (!Object.hasOwn(VALUES_PER_KEY, interpolation))
    throw new SlewcurveError(
      'track.unknown-interpolation',
      `${interpolation} is not one of STEP, LINEAR, CUBICSPLINE, EULER.`,
      place,
    );
  if (input.sequence !== undefined) eulerSequence(input.sequence);
  const size = VALUES_PER_KEY[interpolation];
  if (input.values.length !== size * input.times.length)
    throw new SlewcurveError(
      'track.bad-length',
      `${input.times.length} times need ${size * input.times.length} numbers under ${interpolation} (${size} a key); there are ${input.values.length}.`,
      place,
    );
  if (
    breaks.some(
      (key, i) =>
        !Number.isInteger(key) || key < 0 || key >= input.times.length || key <= (breaks[i - 1] ?? -1),
    )
  )
    throw new SlewcurveError(
      'track.bad-break',
      `breaks must be ascending key numbers below ${input.times.length}; got ${breaks.join(', ')}.`,
      place,
    );
  return Object.freeze({
    id,
    clip,
    times: asFloat64(input.times),
    values: asFloat64(input.values),
    interpolation,
    ...(input.sequence !== undefined && { sequence: input.sequence }),
    breaks: Object.freeze([...breaks]),
    storage: input.storage ?? EXACT_STORAGE,
    source: input.source ?? NOWHERE,
  });
}

/**
 * The checked door to a track: as `storedTrack`, and every number must be finite, every time later than the one before, every
 * orientation longer than 1e-6 (it need not be unit).
 *
 * @throws SlewcurveError what `storedTrack` throws, `track.not-finite`, `track.time-order`, `track.zero-orientation`
 */
export function rotationTrack(input: RotationTrackInput): RotationTrack {
  const track = storedTrack(input);
  for (let key = 0; key < track.times.length; key++) checkKey(track, key);
  return track;
}

function checkKey(track: RotationTrack, key: number): void {
  const place = { track: track.id, clip: track.clip, key, time: track.times[key] };
  const size = VALUES_PER_KEY[track.interpolation];
  const numbers = track.values.subarray(key * size, key * size + size);
  if (!Number.isFinite(track.times[key]) || !numbers.every(Number.isFinite))
    throw new SlewcurveError('track.not-finite', `Key ${key} holds a number that is not finite.`, place);
  if (key > 0 && track.times[key] <= track.times[key - 1])
    throw new SlewcurveError(
      'track.time-order',
      `Key ${key} at ${track.times[key]} s is not later than the key before it at ${track.times[key - 1]} s.`,
      place,
    );
  if (track.interpolation === 'EULER') return;
  const at = track.interpolation === 'CUBICSPLINE' ? 4 : 0;
  if (Math.hypot(numbers[at], numbers[at + 1], numbers[at + 2], numbers[at + 3]) < 1e-6)
    throw new SlewcurveError('track.zero-orientation', `Key ${key} is a quaternion of no length.`, place);
}

function asFloat64(numbers: ArrayLike<number>): Float64Array {
  return numbers instanceof Float64Array ? numbers : Float64Array.from(numbers);
}
