import { SlewcurveError } from '@slewcurve/core';
import type { Follower } from '../animation-file.js';
import { type Json, countMember, listMember, member, textMember } from '../json-value.js';
import { FLOAT, accessorLayout } from './accessor-layout.js';
import { type Decode, boundedDecoder } from './bounded-decoder.js';
import type { Buffers } from './buffers.js';
import type { Container } from './container.js';
import { type RotationChannel, movedNode, samplerPointer } from './rotation-channel.js';
import { readRuns } from './run-reader.js';
import { type ReadTrack, type TrackChange, columnChange } from './track-change.js';

/**
 * What of the channels that are no rotations changes when they follow: their times, and where a sampler is CUBICSPLINE its tangents, which are per second:
 * each segment is to play the path that it played. Played backwards, keys change places, and tangents sign.
 *
 * @throws SlewcurveError `plan.unknown-track`, `plan.cannot-write`, and what hides an accessor
 */
export async function followerChanges(
  container: Container,
  buffers: Buffers,
  tracks: readonly ReadTrack[],
  followers: readonly Follower[],
): Promise<TrackChange[]> {
  const byChannel = new Map<string, { channel: RotationChannel; followers: Follower[] }>();
  for (const follower of followers)
    for (const channel of channelsOf(container, tracks, follower)) {
      const key = `${channel.clipIndex} ${channel.channel}`;
      const known = byChannel.get(key);
      if (known) known.followers.push(follower);
      else byChannel.set(key, { channel, followers: [follower] });
    }
  const changes: TrackChange[] = [];
  const decode = boundedDecoder(container, buffers);
  for (const { channel, followers: own } of byChannel.values()) {
    const change = await changeOf(container, buffers, channel, own, decode);
    if (change) changes.push(change);
  }
  return changes;
}

function channelsOf(
  { json, file }: Container,
  tracks: readonly ReadTrack[],
  { clip, track }: Follower,
): RotationChannel[] {
  const own = tracks.filter((read) => read.track.clip === clip);
  const lead = own.find((read) => track === undefined || read.track.id === track)?.channel;
  if (!lead)
    throw new SlewcurveError(
      'plan.unknown-track',
      `${file} has no rotation track ${track ?? ''} in ${clip}.`,
      { file, clip },
    );
  const { clipIndex } = lead;
  const rotations = new Set(own.map(({ channel }) => channel.channel));
  const animation = listMember(json, 'animations')[clipIndex];
  const samplers = listMember(animation, 'samplers');
  return listMember(animation, 'channels').flatMap((channel, index) => {
    const target = member(channel, 'target');
    const node = movedNode(target);
    const isRotation = rotations.has(index) || textMember(target, 'path') === 'rotation';
    if (isRotation || (track !== undefined && node !== lead.node)) return [];
    const sampler = countMember(channel, 'sampler') ?? -1;
    const parts = samplerParts(samplers[sampler]);
    return parts ? [{ clipIndex, channel: index, sampler, node, ...parts }] : [];
  });
}

function samplerParts(
  json: Json | undefined,
): Pick<RotationChannel, 'input' | 'output' | 'interpolation'> | undefined {
  const input = countMember(json, 'input');
  const output = countMember(json, 'output');
  const interpolation = textMember(json, 'interpolation') ?? 'LINEAR';
  const isKnown = interpolation === 'STEP' || interpolation === 'LINEAR' || interpolation === 'CUBICSPLINE';
  return input === undefined || output === undefined || !isKnown
    ? undefined
    : { input, output, interpolation };
}

async function changeOf(
  container: Container,
  buffers: Buffers,
  channel: RotationChannel,
  followers: readonly Follower[],
  decode: Decode,
): Promise<TrackChange | undefined> {
  const input = accessorLayout(container, channel.input);
  const output = accessorLayout(container, channel.output);
  const runs = [input, output].flatMap(({ run, sparse }) => [
    ...(run ? [run] : []),
    ...(sparse ? [sparse.indices, sparse.values] : []),
  ]);
  const bytesOf = await readRuns(runs, buffers, container.file);
  const times = decode(input, bytesOf);
  const values = decode(output, bytesOf);
  const perKey = times.length === 0 ? 0 : output.count / times.length;
  if (input.type !== 'SCALAR' || input.componentType !== FLOAT || !Number.isInteger(perKey) || perKey === 0)
    throw cannotFollow(container, channel, 'its times and values do not fit together');
  const travelled = travel({ times, values, isCubic: channel.interpolation === 'CUBICSPLINE' }, followers);
  if (
    travelled.times.some(
      (time, key) => key > 0 && !(Math.fround(time) > Math.fround(travelled.times[key - 1] ?? NaN)),
    )
  )
    throw cannotFollow(container, channel, 'two of its keys would fall on one time');
  const pointer = samplerPointer(channel.clipIndex, channel.sampler);
  const label = `animation ${channel.clipIndex}, channel ${channel.channel}`;
  const newInput = columnChange('input', input, times, travelled.times, pointer, { perKey: 1, label });
  const newOutput = columnChange('output', output, values, travelled.values, pointer, { perKey, label });
  if (!newInput && !newOutput) return undefined;
  return {
    read: { channel },
    interpolation: channel.interpolation,
    ...(newInput && { input: newInput }),
    ...(newOutput && { output: newOutput }),
  };
}

interface Keys {
  readonly times: Float64Array;
  readonly values: Float64Array;
  readonly isCubic: boolean;
}

function travel(keys: Keys, followers: readonly Follower[]): Keys {
  let now = keys;
  for (const follower of followers) {
    const moved = now.times.map((time) => follower.newTime(time));
    if (follower.turnsAt !== undefined) {
      now = thereAndBack(now, follower.turnsAt);
      continue;
    }
    now = follower.turnsBack
      ? {
          ...now,
          times: moved.map((_, key) => moved[moved.length - 1 - key] ?? NaN),
          values: turnedBack(now),
        }
      : { ...now, times: moved, values: now.isCubic ? scaledTangents(now, moved) : now.values };
  }
  return now;
}

/** Keys up to the turn, and then all but the last of them mirrored about it. */
function thereAndBack(keys: Keys, turn: number): Keys {
  const { times, values, isCubic } = keys;
  const last = times.length - 1;
  const size = values.length / times.length;
  // A last key that stands before the turn is held until then, and is left as late.
  const from = times[last] === turn ? 1 : 0;
  const back = turnedBack(keys);
  const mirrored = times.map((_, key) => 2 * turn - (times[last - key] ?? 0)).subarray(from);
  const all = Float64Array.of(...values, ...back.subarray(from * size));
  if (isCubic && from === 1) all.set(back.subarray((2 * size) / 3, size), last * size + (2 * size) / 3);
  return { times: Float64Array.of(...times, ...mirrored), values: all, isCubic };
}

function turnedBack({ times, values, isCubic }: Keys): Float64Array {
  const size = values.length / times.length;
  const turned = new Float64Array(values.length);
  for (let key = 0; key < times.length; key++) {
    const from = values.subarray(key * size, (key + 1) * size);
    const at = (times.length - 1 - key) * size;
    turned.set(from, at);
    if (!isCubic) continue;
    const part = size / 3;
    turned.set(
      from.subarray(2 * part).map((number) => -number),
      at,
    );
    turned.set(
      from.subarray(0, part).map((number) => -number),
      at + 2 * part,
    );
  }
  return turned;
}

function scaledTangents({ times, values }: Keys, moved: Float64Array): Float64Array {
  const scaled = values.slice();
  const part = values.length / times.length / 3;
  for (let key = 0; key + 1 < times.length; key++) {
    const [from, to] = [times[key] ?? 0, times[key + 1] ?? 0];
    const scale = (to - from) / ((moved[key + 1] ?? 0) - (moved[key] ?? 0));
    if (scale === 1) continue;
    for (let i = 0; i < part; i++) {
      const leaving = 3 * part * key + 2 * part + i;
      const arriving = 3 * part * (key + 1) + i;
      scaled[leaving] = (scaled[leaving] ?? 0) * scale;
      scaled[arriving] = (scaled[arriving] ?? 0) * scale;
    }
  }
  return scaled;
}

function cannotFollow(
  { file }: Container,
  { clipIndex, channel }: RotationChannel,
  why: string,
): SlewcurveError {
  return new SlewcurveError(
    'plan.cannot-write',
    `${file}: channel ${channel} of animation ${clipIndex} cannot go along: ${why}. Take the track alone along, or mend that channel first.`,
    { file, pointer: `/animations/${clipIndex}/channels/${channel}` },
  );
}
