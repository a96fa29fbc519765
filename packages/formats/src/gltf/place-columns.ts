import type { JsonEditor } from '../json-text.js';
import { type Json, listMember, member } from '../json-value.js';
import type { AccessorReaders } from './accessor-readers.js';
import type { RunBytes } from './accessor-data.js';
import type { Container } from './container.js';
import { type BufferWrite, changedKeys } from './in-place.js';
import { type NewData, addView } from './new-data.js';
import { boundsOf, sameNumbers } from './stored-numbers.js';
import type { ColumnChange } from './track-change.js';

/** What placing columns needs to know of the file. */
export interface Ground {
  readonly container: Container;
  readonly editor: JsonEditor;
  readonly data: NewData;
  readonly readers: AccessorReaders;
  /** Accessors whose bytes something else reads. */
  readonly claimed: ReadonlySet<number>;
  /** Buffers that can be overwritten. */
  readonly writable: ReadonlySet<number>;
  /** How many accessors name each view. */
  readonly viewUsers: ReadonlyMap<number, number>;
  readonly bytesOf: RunBytes;
  readonly writes: BufferWrite[];
}

/**
 * Finds a place for every changed column; the accessor that each reader shall name from now on. An accessor that only
 * changed readers use takes the first new content itself, on its own bytes where they suffice; any other content gets an
 * accessor of its own, so that whoever shares the old one still reads what it read.
 */
export function placeColumns(ground: Ground, changes: readonly ColumnChange[]): Map<ColumnChange, number> {
  const places = new Map<ColumnChange, number>();
  const moves: ColumnChange[] = [];
  const byAccessor = new Map<number, ColumnChange[]>();
  for (const change of changes) {
    const known = byAccessor.get(change.layout.index);
    if (known) known.push(change);
    else byAccessor.set(change.layout.index, [change]);
  }
  for (const [accessor, wanted] of byAccessor) {
    const contents = distinct(wanted);
    const covered = new Set(wanted.map(({ reader }) => reader));
    const readers = ground.readers.get(accessor) ?? [];
    const alone =
      readers.every((reader) => covered.has(reader)) && new Set(wanted.map(({ kind }) => kind)).size === 1;
    contents.forEach(([first, ...rest], i) => {
      const place = alone && i === 0 ? takeOver(ground, first, moves) : addAccessor(ground, first);
      for (const change of [first, ...rest]) places.set(change, place);
    });
  }
  moveAccessors(ground, moves);
  return places;
}

type Alike = [ColumnChange, ...ColumnChange[]];

/** Changes with equal content, together. Content is compared only within equal lengths and first and last numbers. */
function distinct(changes: readonly ColumnChange[]): Alike[] {
  const groups = new Map<string, Alike[]>();
  for (const change of changes) {
    const { numbers, stored } = change;
    const mark = [stored.componentType, numbers.length, numbers[0], numbers.at(-1)].join(' ');
    const alike = groups.get(mark) ?? [];
    groups.set(mark, alike);
    const same = alike.find(([first]) => sameNumbers(first.numbers, numbers));
    if (same) same.push(change);
    else alike.push([change]);
  }
  return [...groups.values()].flat();
}

function takeOver(ground: Ground, change: ColumnChange, moves: ColumnChange[]): number {
  const { layout, stored } = change;
  const { run } = layout;
  const sameShape =
    change.numbers.length === change.original.length && stored.componentType === layout.componentType;
  if (
    !run ||
    layout.sparse ||
    !sameShape ||
    ground.claimed.has(layout.index) ||
    !ground.writable.has(run.buffer)
  ) {
    moves.push(change);
    return layout.index;
  }
  const old = ground.bytesOf(run);
  keepUnchanged(change, old);
  const [one, many] = change.kind === 'input' ? ['time', 'times'] : ['values', 'values'];
  ground.writes.push(
    ...changedKeys(run, change.perKey, old, stored.bytes, (first, last) =>
      first === last
        ? `${change.label}: ${one} of key ${first}`
        : `${change.label}: ${many} of keys ${first} to ${last}`,
    ),
  );
  updateBounds(ground, change);
  return layout.index;
}

/** Numbers that did not change keep the bytes they had, also where other bytes mean the same (-128 and -127 are both -1). */
function keepUnchanged({ layout, numbers, original, stored }: ColumnChange, old: Uint8Array): void {
  const { bytes } = layout.component;
  const { run, size } = layout;
  if (!run) return;
  numbers.forEach((number, i) => {
    if (!Object.is(number, original[i])) return;
    const from = Math.floor(i / size) * run.stride + (i % size) * bytes;
    stored.bytes.set(old.subarray(from, from + bytes), i * bytes);
  });
}

/** Sets the numbers of `min` and `max` that are there and no longer true. */
function updateBounds({ container, editor }: Ground, { layout, stored }: ColumnChange): void {
  const json = listMember(container.json, 'accessors')[layout.index];
  const bounds = boundsOf(layout, stored);
  if (!bounds) return;
  for (const name of ['min', 'max'] as const) {
    const old = listMember(json, name);
    if (old.length !== layout.size) continue;
    bounds[name].forEach((bound, i) => {
      if (old[i] !== bound) editor.setElement(`/accessors/${layout.index}/${name}`, i, numberText(bound));
    });
  }
}

/**
 * Lets accessors that nobody else reads describe new bytes; their names, extras and whatever else they have stay. A view that
 * only moved accessors used is taken over by the first of them.
 */
function moveAccessors(ground: Ground, moves: readonly ColumnChange[]): void {
  const leaving = new Map<number, number>();
  for (const { layout } of moves)
    if (layout.run) leaving.set(layout.run.view, (leaving.get(layout.run.view) ?? 0) + 1);
  for (const change of moves) {
    const view = change.layout.run?.view;
    const free = view !== undefined && leaving.get(view) === ground.viewUsers.get(view);
    if (view !== undefined) leaving.delete(view);
    moveAccessor(ground, change, free ? view : undefined);
  }
}

function moveAccessor(ground: Ground, change: ColumnChange, freeView: number | undefined): void {
  const { container, editor } = ground;
  const { index } = change.layout;
  const json = listMember(container.json, 'accessors')[index];
  const block = ground.data.add(change.stored.bytes);
  if (freeView !== undefined) {
    const members = Object.entries(block).map(([name, value]) => [name, String(value)]);
    editor.rewrite(`/bufferViews/${freeView}`, Object.fromEntries(members), ['byteStride']);
  }
  const set = { bufferView: String(freeView ?? addView(editor, block)), ...description(change, json) };
  editor.rewrite(`/accessors/${index}`, set, ['byteOffset', 'sparse', 'normalized', 'min', 'max']);
}

function addAccessor(ground: Ground, change: ColumnChange): number {
  const json = listMember(ground.container.json, 'accessors')[change.layout.index];
  const view = addView(ground.editor, ground.data.add(change.stored.bytes));
  const members = { bufferView: String(view), ...description(change, json), type: `"${change.layout.type}"` };
  const text = Object.entries(members).map(([name, value]) => `"${name}":${value}`);
  return ground.editor.append('', 'accessors', `{${text.join(',')}}`);
}

/** The members that describe new content. glTF 2.0 requires bounds of times; others get them where they had them. */
function description(
  { kind, layout, stored, numbers }: ColumnChange,
  json: Json | undefined,
): Record<string, string> {
  const bounds = boundsOf(layout, stored);
  const bounded =
    kind === 'input' || (member(json, 'min') !== undefined && member(json, 'max') !== undefined);
  return {
    componentType: String(stored.componentType),
    ...(stored.normalized && { normalized: 'true' }),
    count: String(numbers.length / layout.size),
    ...(bounded && bounds && { min: listText(bounds.min), max: listText(bounds.max) }),
  };
}

function listText(numbers: readonly number[]): string {
  return `[${numbers.map(numberText).join(',')}]`;
}

/** Shortest text that reads back as the same float64. */
function numberText(number: number): string {
  return Object.is(number, -0) ? '0' : String(number);
}
