import type { JsonEditor } from '../json-text.js';
import { countMember, listMember } from '../json-value.js';
import type { Container } from './container.js';
import { type RotationChannel, channelPointer, samplerPointer } from './rotation-channel.js';
import type { ColumnChange, TrackChange } from './track-change.js';

/** What a channel's sampler shall say. */
interface Wiring {
  readonly input: number;
  readonly output: number;
  readonly interpolation: RotationChannel['interpolation'];
}

/**
 * Lets each changed channel read its new accessors: by its own sampler where no other channel needs that one as it was, by a
 * new one elsewhere.
 */
export function rewireSamplers(
  samplerUsers: ReadonlyMap<string, number>,
  editor: JsonEditor,
  changes: readonly TrackChange[],
  places: ReadonlyMap<ColumnChange, number>,
): void {
  const bySampler = new Map<string, TrackChange[]>();
  for (const change of changes) {
    const { clipIndex, sampler } = change.read.channel;
    const pointer = samplerPointer(clipIndex, sampler);
    const known = bySampler.get(pointer);
    if (known) known.push(change);
    else bySampler.set(pointer, [change]);
  }
  for (const [pointer, users] of bySampler) {
    const clip = users[0]?.read.channel.clipIndex ?? 0;
    const alone = samplerUsers.get(pointer) === users.length;
    // The first wiring takes the sampler over where every channel that reads it changes; the others get one each.
    const made = new Map<string, number | undefined>();
    for (const change of users) {
      const wiring = wiringOf(change, places);
      const text = JSON.stringify(wiring);
      if (alone && made.size === 0) {
        setSampler(editor, pointer, change.read.channel, wiring);
        made.set(text, undefined);
      } else if (sameAsBefore(change.read.channel, wiring)) continue;
      else {
        if (!made.has(text)) made.set(text, editor.append(`/animations/${clip}`, 'samplers', text));
        const sampler = made.get(text);
        if (sampler !== undefined)
          editor.setMember(channelPointer(clip, change.read.channel.channel), 'sampler', String(sampler));
      }
    }
  }
}

function wiringOf(change: TrackChange, places: ReadonlyMap<ColumnChange, number>): Wiring {
  const { channel } = change.read;
  const place = (column: ColumnChange | undefined, old: number): number =>
    (column && places.get(column)) ?? old;
  return {
    input: place(change.input, channel.input),
    output: place(change.output, channel.output),
    interpolation: change.interpolation,
  };
}

function sameAsBefore(old: Wiring, wiring: Wiring): boolean {
  return (
    old.input === wiring.input && old.output === wiring.output && old.interpolation === wiring.interpolation
  );
}

function setSampler(editor: JsonEditor, pointer: string, old: Wiring, wiring: Wiring): void {
  if (wiring.input !== old.input) editor.setMember(pointer, 'input', String(wiring.input));
  if (wiring.output !== old.output) editor.setMember(pointer, 'output', String(wiring.output));
  if (wiring.interpolation !== old.interpolation)
    editor.setMember(pointer, 'interpolation', JSON.stringify(wiring.interpolation));
}

/** How many channels read each sampler, by the sampler's pointer. */
export function countSamplerUsers(container: Container): ReadonlyMap<string, number> {
  const users = new Map<string, number>();
  listMember(container.json, 'animations').forEach((clip, index) => {
    for (const channel of listMember(clip, 'channels')) {
      const pointer = samplerPointer(index, countMember(channel, 'sampler') ?? -1);
      users.set(pointer, (users.get(pointer) ?? 0) + 1);
    }
  });
  return users;
}
