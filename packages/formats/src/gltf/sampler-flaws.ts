import { type Json, countMember, listMember, member, numbersMember, textMember } from '../json-value.js';
import { type AccessorLayout, FLOAT } from './accessor-layout.js';
import { accessorReaders } from './accessor-readers.js';
import type { Container } from './container.js';
import { type Problem, problem } from './problem.js';
import {
  POINTER_EXTENSION,
  type RotationChannel,
  channelPointer,
  samplerPointer,
} from './rotation-channel.js';
import type { Columns } from './rotation-columns.js';

/** What glTF 2.0 forbids of one rotation and what it reads, though it can be read; the track's place is put to each. */
export type FlawsOf = (channel: RotationChannel, columns: Columns, track: string, clip: string) => Problem[];

type Add = (code: string, pointer: string, what: string, level?: Problem['level']) => void;

/** Finds flaws. Those of an accessor are told once, for the first track that reads it. */
export function flawFinder(container: Container): FlawsOf {
  const told = new Set<number>();
  const others = otherUses(container);
  return (channel, columns, track, clip) => {
    const found: Problem[] = [];
    const place = { clip, track, node: channel.node };
    const add: Add = (code, pointer, what, level) => {
      found.push(problem(container, code, pointer, what, place, level));
    };
    flawsOfKeys(channel, columns, add);
    flawsOfTarget(container, channel, add);
    for (const [layout, numbers] of [
      [columns.input, columns.times],
      [columns.output, columns.values],
    ] as const) {
      if (told.has(layout.index)) continue;
      told.add(layout.index);
      flawsOfAccessor(container, layout, columns, add);
      flawsOfBounds(container, layout, numbers, layout === columns.input, add);
      flawsOfSharing(layout, others, add);
    }
    return found;
  };
}

function flawsOfKeys(channel: RotationChannel, { input, times }: Columns, add: Add): void {
  const sampler = samplerPointer(channel.clipIndex, channel.sampler);
  const least = channel.interpolation === 'CUBICSPLINE' ? 2 : 1;
  if (times.length < least)
    add('gltf.too-few-keys', sampler, `has ${times.length} keys; ${channel.interpolation} needs ${least}.`);
  const early = times.findIndex((time) => time < 0);
  if (early >= 0)
    add(
      'gltf.negative-time',
      `/accessors/${input.index}`,
      `gives key ${early} the time ${times[early] ?? 0} s; glTF's times are not below 0, and players may begin at 0.`,
    );
}

function flawsOfTarget(container: Container, { clipIndex, channel, node }: RotationChannel, add: Add): void {
  const clip = listMember(container.json, 'animations')[clipIndex];
  const target = member(listMember(clip, 'channels')[channel], 'target');
  const pointer = `${channelPointer(clipIndex, channel)}/target`;
  if (member(listMember(container.json, 'nodes')[node], 'matrix') !== undefined)
    add(
      'gltf.matrix-target',
      pointer,
      `turns node ${node}, which has a matrix; a moved node needs rotation, translation and scale.`,
    );
  if (textMember(target, 'path') !== 'pointer') return;
  if (member(target, 'node') !== undefined)
    add('gltf.pointer-with-node', `${pointer}/node`, `must not be there beside a ${POINTER_EXTENSION}.`);
  if (!listMember(container.json, 'extensionsUsed').includes(POINTER_EXTENSION))
    add(
      'gltf.undeclared-extension',
      `${pointer}/extensions`,
      `holds ${POINTER_EXTENSION}, which extensionsUsed does not name.`,
    );
}

function flawsOfAccessor({ json }: Container, layout: AccessorLayout, { unsorted }: Columns, add: Add): void {
  const { index, run, component, sparse } = layout;
  const pointer = `/accessors/${index}`;
  const strides = [run, sparse?.indices, sparse?.values].filter((each) => each?.strided === true);
  for (const view of new Set(strides.map((each) => each?.view)))
    add(
      'gltf.strided',
      `/bufferViews/${view}/byteStride`,
      `is set, which only mesh data may have (for ${pointer}).`,
    );
  if (run && run.offset % component.bytes !== 0)
    add(
      'gltf.misaligned',
      pointer,
      `starts at byte ${run.offset} of its buffer; its numbers must start at multiples of ${component.bytes}.`,
    );
  if (layout.componentType === FLOAT && member(listMember(json, 'accessors')[index], 'normalized') === true)
    add('gltf.normalised-float', pointer, 'is called normalised, which only integers can be.');
  if (sparse?.indices.count === 0) add('gltf.empty-sparse', `${pointer}/sparse/count`, 'must be at least 1.');
  if (unsorted.includes(index))
    add('gltf.sparse-order', `${pointer}/sparse/indices`, 'must rise from one to the next.');
}

/** Bounds as the file states them against the numbers that it holds. Integers' bounds are stated as stored. */
function flawsOfBounds(
  container: Container,
  layout: AccessorLayout,
  numbers: Float64Array,
  isTimes: boolean,
  add: Add,
): void {
  const json = listMember(container.json, 'accessors')[layout.index];
  const pointer = `/accessors/${layout.index}`;
  const stated = (['min', 'max'] as const).filter((name) => member(json, name) !== undefined);
  if (isTimes && stated.length < 2) {
    add('gltf.no-bounds', pointer, 'holds times and lacks the min and max that it must have.');
    return;
  }
  // Nothing is stored where there is neither a view nor a sparse part.
  if (!layout.run && !layout.sparse) return;
  // What is not finite has a finding of its own.
  if (numbers.length === 0 || stated.length === 0 || !numbers.every(Number.isFinite)) return;
  for (const name of stated) flawOfBound(layout, json, name, numbers, isTimes, add);
}

function flawOfBound(
  layout: AccessorLayout,
  json: Json | undefined,
  name: 'min' | 'max',
  numbers: Float64Array,
  isTimes: boolean,
  add: Add,
): void {
  const at = `/accessors/${layout.index}/${name}`;
  const bound = numbersMember(json, name, layout.size);
  if (!bound) {
    add('gltf.bad-bounds', at, `must be a list of ${layout.size} numbers.`);
    return;
  }
  const pick = name === 'min' ? Math.min : Math.max;
  const { normalized, component } = layout;
  const float = component.name === 'float32';
  for (let part = 0; part < layout.size; part++) {
    let held = numbers[part] ?? 0;
    for (let i = part; i < numbers.length; i += layout.size) held = pick(held, numbers[i] ?? held);
    const raw = bound[part] ?? 0;
    const says = float ? Math.fround(raw) : normalized ? Math.max(raw / component.top, -1) : raw;
    if (says === held) continue;
    const what = isTimes ? 'Players may take the wrong length from it.' : 'No player goes by it.';
    add(
      'gltf.wrong-bounds',
      `${at}/${part}`,
      `is ${raw}, and what is stored is ${float || !normalized ? held : Math.round(held * component.top)}. ${what}`,
      isTimes ? 'warning' : 'note',
    );
    return;
  }
}

interface OtherUses {
  readonly accessors: ReadonlyMap<number, string>;
  readonly views: ReadonlyMap<number, string>;
}

/** What else than animation reads accessors and views: the first pointer for each. */
function otherUses({ json }: Container): OtherUses {
  const accessors = new Map<number, string>();
  const views = new Map<number, string>();
  for (const [index, pointers] of accessorReaders(json)) {
    const other = pointers.find((pointer) => !pointer.startsWith('/animations/'));
    if (other === undefined) continue;
    accessors.set(index, other);
    const view = countMember(listMember(json, 'accessors')[index], 'bufferView');
    if (view !== undefined && !views.has(view)) views.set(view, other);
  }
  listMember(json, 'images').forEach((image, i) => {
    const view = countMember(image, 'bufferView');
    if (view !== undefined) views.set(view, `/images/${i}`);
  });
  return { accessors, views };
}

function flawsOfSharing({ index, run }: AccessorLayout, { accessors, views }: OtherUses, add: Add): void {
  const reader = accessors.get(index) ?? (run && views.get(run.view));
  if (reader === undefined) return;
  const pointer = accessors.has(index) ? `/accessors/${index}` : `/bufferViews/${run?.view ?? ''}`;
  add('gltf.mixed-use', pointer, `holds keys and is also read by ${reader}; each use needs data of its own.`);
}
