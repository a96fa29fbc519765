import { type RotationTrack, SlewcurveError, VALUES_PER_KEY } from '@slewcurve/core';
import { pairTracks } from '../changed-tracks.js';
import type { AccessorLayout } from './accessor-layout.js';
import type { Columns } from './rotation-columns.js';
import { type RotationChannel, samplerPointer } from './rotation-channel.js';
import { type StoredNumbers, readBack, sameNumbers, storeNumbers } from './stored-numbers.js';

/** A track as it was read, with the channel and the columns that it came from. */
export interface ReadTrack {
  readonly track: RotationTrack;
  readonly channel: RotationChannel;
  readonly columns: Columns;
}

/** New numbers for one accessor, as one sampler wants them. */
export interface ColumnChange {
  readonly kind: 'input' | 'output';
  readonly layout: AccessorLayout;
  readonly original: Float64Array;
  readonly numbers: Float64Array;
  readonly stored: StoredNumbers;
  /** JSON pointer of the sampler's `input` or `output`. */
  readonly reader: string;
  /** Accessor elements of a key. */
  readonly perKey: number;
  /** The track, for people. */
  readonly label: string;
}

/** What one track asks of the file. A column that stays as it is has no change. */
export interface TrackChange {
  readonly read: Pick<ReadTrack, 'channel'>;
  readonly interpolation: RotationChannel['interpolation'];
  readonly input?: ColumnChange;
  readonly output?: ColumnChange;
}

/**
 * What of each changed track differs from the file once it is rounded as the file stores it. Tracks that don't differ are
 * left out.
 *
 * @throws SlewcurveError `plan.unknown-track`, `plan.doubled-track`, `plan.cannot-write`
 */
export function trackChanges(
  file: string,
  tracks: readonly ReadTrack[],
  changed: readonly RotationTrack[],
): TrackChange[] {
  return pairTracks(file, tracks, changed).flatMap(({ read, track }) => trackChange(file, read, track) ?? []);
}

function trackChange(file: string, read: ReadTrack, track: RotationTrack): TrackChange | undefined {
  const { interpolation, times, values } = track;
  const { channel, columns } = read;
  const place = { file, clip: track.clip, track: track.id };
  if (interpolation === 'EULER')
    throw new SlewcurveError(
      'plan.cannot-write',
      `${track.id} in ${track.clip} holds Euler angles, which glTF can't store. Convert it to quaternions first.`,
      place,
    );
  if (values.length !== VALUES_PER_KEY[interpolation] * times.length)
    throw new SlewcurveError(
      'plan.cannot-write',
      `${track.id} in ${track.clip}: ${times.length} keys under ${interpolation} need ${VALUES_PER_KEY[interpolation] * times.length} numbers; there are ${values.length}.`,
      place,
    );
  const pointer = samplerPointer(channel.clipIndex, channel.sampler);
  const common = { perKey: VALUES_PER_KEY[interpolation] / 4, label: `${track.clip} ${track.id}` };
  const input = columnChange('input', columns.input, columns.times, times, pointer, { ...common, perKey: 1 });
  const output = columnChange('output', columns.output, columns.values, values, pointer, common);
  if (!input && !output && interpolation === channel.interpolation) return undefined;
  return { read, interpolation, ...(input && { input }), ...(output && { output }) };
}

/** The change of one column; undefined where it stays as it is, once rounded as it is stored. */
export function columnChange(
  kind: ColumnChange['kind'],
  layout: AccessorLayout,
  original: Float64Array,
  numbers: Float64Array,
  sampler: string,
  common: Pick<ColumnChange, 'perKey' | 'label'>,
): ColumnChange | undefined {
  if (numbers === original) return undefined;
  const stored = storeNumbers(layout, numbers);
  const held = readBack(layout, stored);
  if (sameNumbers(held, original)) return undefined;
  return { kind, layout, original, numbers: held, stored, reader: `${sampler}/${kind}`, ...common };
}
