import { type Clip, type RotationTrack, type Storage, frameGrid, storedTrack } from '@slewcurve/core';
import {
  type Json,
  type JsonObject,
  countMember,
  isObject,
  listMember,
  member,
  shown,
  textMember,
} from '../json-value.js';
import { type AccessorLayout, AccessorFault } from './accessor-layout.js';
import { type AccessorReaders, accessorReaders } from './accessor-readers.js';
import type { Buffers } from './buffers.js';
import type { Container } from './container.js';
import { uniqueLabels } from '../node-paths.js';
import { type Problem, problem, problemOf } from './problem.js';
import type { Problems } from './problem-list.js';
import type { ReadTrack } from './track-change.js';
import { type ColumnsOf, type Columns, readColumns } from './rotation-columns.js';
import { flawFinder } from './sampler-flaws.js';
import { type RotationChannel, channelPointer, rotationChannel, samplerPointer } from './rotation-channel.js';

/** Pointers kept of what shares an accessor. A take of a thousand joints on one clock would list a million otherwise. */
const MOST_SHARERS = 16;

/** How often each number may be read by way of shared accessors, on average. Tracks are surveyed one by one, whatever they share. */
const MOST_SHARED = 64;

/** The clips of a file, and every track of theirs with what writing it back needs. */
export interface ReadClips {
  readonly clips: readonly Clip[];
  readonly tracks: readonly ReadTrack[];
}

/** Every clip with its rotation tracks. What hides a channel is added to `problems`; the others are read all the same. */
export async function readClips(
  container: Container,
  paths: readonly string[],
  buffers: Buffers,
  problems: Problems,
): Promise<ReadClips> {
  const stated = member(container.json, 'animations');
  if (stated !== undefined && !Array.isArray(stated))
    problems.push(
      problem(
        container,
        'gltf.bad-clip',
        '/animations',
        `must be a list; it is ${shown(stated)}.`,
        {},
        'error',
      ),
    );
  else noteEmpty(container, '/animations', stated, problems);
  const animations = listMember(container.json, 'animations');
  const names = uniqueLabels(
    animations.map((clip) => textMember(clip, 'name')),
    (index) => `#${index}`,
  );
  const channels = animations.map((_, index) =>
    rotationChannels(container, index, names[index] ?? '', problems),
  );
  const columnsOf = await readColumns(container, channels.flat(), buffers);
  const sharers = sharersOf(container.json);
  const flawsOf = flawFinder(container);
  let left = MOST_SHARED * (65_536 + container.source.size + buffers.opened());
  const all: ReadTrack[] = [];
  const clips = names.map((name, index) => {
    const own = channels[index] ?? [];
    const ids = uniqueLabels(
      own.map(({ node }) => paths[node] ?? `#${node}`),
      (i) => `#${i}`,
    );
    const tracks = own.flatMap((channel, i) => {
      const columns = columnsOrProblem(channel, columnsOf, name, problems);
      if (!columns) return [];
      left -= columns.times.length + columns.values.length;
      if (left < 0) {
        problems.push(tooShared(container, channel, name));
        return [];
      }
      const id = ids[i] ?? '';
      problems.push(...flawsOf(channel, columns, id, name));
      const track = trackOf(channel, columns, id, name, sharers);
      all.push({ track, channel, columns });
      return [track];
    });
    return clipOf(name, index, tracks);
  });
  return { clips, tracks: all };
}

function rotationChannels(
  container: Container,
  clipIndex: number,
  clip: string,
  problems: Problems,
): RotationChannel[] {
  const json = listMember(container.json, 'animations')[clipIndex];
  const pointer = `/animations/${clipIndex}`;
  const list = member(json, 'channels');
  if (!isObject(json) || !Array.isArray(list)) {
    problems.push(
      problem(
        container,
        'gltf.bad-clip',
        `${pointer}/channels`,
        `must be a list; it is ${shown(list)}.`,
        { clip },
        'error',
      ),
    );
    return [];
  }
  noteEmpty(container, `${pointer}/channels`, list, problems);
  const found: RotationChannel[] = [];
  const turned = new Map<number, number>();
  list.forEach((_, index) => {
    try {
      const channel = rotationChannel(container, clipIndex, index);
      if (!channel) return;
      const first = turned.get(channel.node);
      if (first !== undefined)
        problems.push(
          problem(
            container,
            'gltf.doubled-target',
            channelPointer(clipIndex, index),
            `turns node ${channel.node}, as ${channelPointer(clipIndex, first)} does; readers play one of them. Take one out.`,
            { clip, node: channel.node },
          ),
        );
      else turned.set(channel.node, index);
      found.push(channel);
    } catch (error) {
      if (!(error instanceof AccessorFault)) throw error;
      problems.push(problemOf(error, { clip }));
    }
  });
  return found;
}

function tooShared(
  container: Container,
  { clipIndex, channel, node }: RotationChannel,
  clip: string,
): Problem {
  return problem(
    container,
    'gltf.more-than-held',
    channelPointer(clipIndex, channel),
    `and those before it read more keys, over and over, than a file of ${container.source.size} bytes can mean; it has no track.`,
    { clip, node },
    'error',
  );
}

/** A list that the format allows only with something in it. */
function noteEmpty(container: Container, pointer: string, list: Json | undefined, problems: Problems): void {
  if (Array.isArray(list) && list.length === 0)
    problems.push(
      problem(container, 'gltf.empty-list', pointer, 'is empty, and should be left out then.', {}, 'note'),
    );
}

function columnsOrProblem(
  channel: RotationChannel,
  columnsOf: ColumnsOf,
  clip: string,
  problems: Problems,
): Columns | undefined {
  try {
    return columnsOf(channel);
  } catch (error) {
    if (!(error instanceof AccessorFault)) throw error;
    problems.push(problemOf(error, { clip, node: channel.node }));
    return undefined;
  }
}

type SharersOf = (channel: RotationChannel) => readonly string[];

function sharersOf(json: JsonObject): SharersOf {
  const readers: AccessorReaders = accessorReaders(json);
  const users = listMember(json, 'animations').map((clip) => {
    const bySampler = new Map<number, number[]>();
    listMember(clip, 'channels').forEach((channel, index) => {
      const sampler = countMember(channel, 'sampler') ?? -1;
      const known = bySampler.get(sampler);
      if (known) known.push(index);
      else bySampler.set(sampler, [index]);
    });
    return bySampler;
  });
  return ({ clipIndex, channel, sampler, input, output }) => {
    const own = samplerPointer(clipIndex, sampler);
    const others = (index: number, name: string): string[] =>
      (readers.get(index) ?? []).slice(0, MOST_SHARERS + 1).filter((pointer) => pointer !== `${own}/${name}`);
    const channels = (users[clipIndex]?.get(sampler) ?? [])
      .slice(0, MOST_SHARERS + 1)
      .filter((user) => user !== channel)
      .map((user) => channelPointer(clipIndex, user));
    const shared = [
      ...channels,
      ...others(output, 'output').slice(0, MOST_SHARERS),
      ...others(input, 'input').slice(0, MOST_SHARERS),
    ];
    return Object.freeze(shared);
  };
}

function trackOf(
  channel: RotationChannel,
  columns: Columns,
  id: string,
  clip: string,
  sharers: SharersOf,
): RotationTrack {
  return storedTrack({
    id,
    clip,
    times: columns.times,
    values: columns.values,
    interpolation: channel.interpolation,
    storage: Object.freeze({
      component: stored(columns.output),
      timeComponent: stored(columns.input),
    }),
    source: Object.freeze({
      clip,
      clipIndex: channel.clipIndex,
      node: channel.node,
      sampler: channel.sampler,
      channel: channel.channel,
      times: channel.input,
      values: channel.output,
      sharedWith: sharers(channel),
    }),
  });
}

function stored({ component }: AccessorLayout): Storage['component'] {
  return component.name === 'uint32' ? 'float32' : component.name;
}

function clipOf(name: string, index: number, tracks: readonly RotationTrack[]): Clip {
  const clocks = [...new Set(tracks.map(({ times }) => times))];
  let start = Infinity;
  let end = -Infinity;
  for (const times of clocks)
    for (const time of times) {
      if (!Number.isFinite(time)) continue;
      start = Math.min(start, time);
      end = Math.max(end, time);
    }
  const frameRate = frameGrid(clocks);
  return Object.freeze({
    name,
    index,
    tracks: Object.freeze(tracks),
    start: start > end ? 0 : start,
    end: start > end ? 0 : end,
    ...(frameRate !== undefined && { frameRate }),
    loop: false,
    marks: Object.freeze([]),
  });
}
