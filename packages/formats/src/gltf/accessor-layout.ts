import { SlewcurveError, type Storage } from '@slewcurve/core';
import { type Json, countMember, isObject, listMember, member, shown, textMember } from '../json-value.js';
import type { Container } from './container.js';
import { requiredExtension } from './required-extension.js';

/** Component types by glTF 2.0's number ("Accessor Data Types"). `top` is what a normalised 1 is stored as. */
export const COMPONENTS: Readonly<Record<number, Component>> = Object.freeze({
  5120: { name: 'int8', bytes: 1, top: 127 },
  5121: { name: 'uint8', bytes: 1, top: 255 },
  5122: { name: 'int16', bytes: 2, top: 32_767 },
  5123: { name: 'uint16', bytes: 2, top: 65_535 },
  5125: { name: 'uint32', bytes: 4, top: 4_294_967_295 },
  5126: { name: 'float32', bytes: 4, top: 1 },
});

export interface Component {
  readonly name: Exclude<Storage['component'], 'float64' | 'text'> | 'uint32';
  readonly bytes: number;
  readonly top: number;
}

export const FLOAT = 5126;

const TYPE_SIZES: Readonly<Record<string, number>> = Object.freeze({
  SCALAR: 1,
  VEC2: 2,
  VEC3: 3,
  VEC4: 4,
  MAT2: 4,
  MAT3: 9,
  MAT4: 16,
});

/** A run of bytes in a buffer: `count` elements of `size` bytes, `stride` apart. */
export interface Run {
  readonly buffer: number;
  readonly view: number;
  readonly offset: number;
  readonly stride: number;
  readonly size: number;
  readonly count: number;
  /** Whether the view itself gives a stride. */
  readonly strided: boolean;
}

/** An accessor after every index, length and offset has been checked. */
export interface AccessorLayout {
  readonly index: number;
  readonly componentType: number;
  readonly component: Component;
  readonly normalized: boolean;
  readonly type: string;
  /** Numbers in an element. */
  readonly size: number;
  readonly count: number;
  /** Where the elements stand; without it they are zeros. */
  readonly run?: Run;
  readonly sparse?: { readonly indices: Run; readonly indexType: number; readonly values: Run };
}

/** A fault of one accessor, which hides only what reads it. */
export class AccessorFault extends SlewcurveError {}

function fault(container: Container, code: string, pointer: string, what: string): AccessorFault {
  return new AccessorFault(code, `${container.file}: ${pointer} ${what}`, { file: container.file, pointer });
}

/**
 * Checks an accessor's description against its views and buffers; reads no data.
 *
 * @throws AccessorFault `gltf.no-accessor`, `gltf.bad-accessor`, `gltf.no-view`, `gltf.bad-view`, `gltf.view-out-of-range`,
 * `gltf.accessor-out-of-range`, `gltf.bad-sparse`, `gltf.needs-extension`
 */
export function accessorLayout(container: Container, index: number): AccessorLayout {
  const accessors = listMember(container.json, 'accessors');
  const json = accessors[index];
  const pointer = `/accessors/${index}`;
  if (json === undefined)
    throw fault(
      container,
      'gltf.no-accessor',
      pointer,
      `does not exist; there are ${accessors.length} accessors.`,
    );
  refuseHidden(container, json, pointer);
  const componentType = countMember(json, 'componentType') ?? -1;
  const component = Object.hasOwn(COMPONENTS, componentType) ? COMPONENTS[componentType] : undefined;
  const type = textMember(json, 'type') ?? '';
  const size = Object.hasOwn(TYPE_SIZES, type) ? TYPE_SIZES[type] : undefined;
  const count = countMember(json, 'count');
  if (!component || size === undefined || count === undefined)
    throw fault(
      container,
      'gltf.bad-accessor',
      pointer,
      `needs a componentType (5120–5126), a type (SCALAR … MAT4) and a whole count; it has ${shown(member(json, 'componentType'))}, ${shown(member(json, 'type'))} and ${shown(member(json, 'count'))}.`,
    );
  const stated = member(json, 'normalized');
  const normalized = stated === undefined ? false : stated;
  if (typeof normalized !== 'boolean')
    throw fault(
      container,
      'gltf.bad-accessor',
      `${pointer}/normalized`,
      `must be true or false; it is ${shown(normalized)}.`,
    );
  const layout = {
    index,
    componentType,
    component,
    type,
    size,
    count,
    normalized,
  };
  const run =
    member(json, 'bufferView') === undefined
      ? undefined
      : runOf(container, json, pointer, count, size * component.bytes);
  const sparse = sparseOf(container, layout, json);
  return { ...layout, ...(run && { run }), ...(sparse && { sparse }) };
}

/** The run that an accessor (or half of a sparse one) describes: it has `bufferView` and maybe `byteOffset`. */
function runOf(container: Container, json: Json, pointer: string, count: number, size: number): Run {
  const view = viewOf(container, json, pointer);
  const within = countOr(container, json, 'byteOffset', 0, pointer);
  const stride = view.stride ?? size;
  if (stride < size)
    throw fault(
      container,
      'gltf.bad-view',
      `/bufferViews/${view.index}/byteStride`,
      `is ${stride}; the elements of ${pointer} take ${size} bytes each.`,
    );
  const needs = count === 0 ? 0 : (count - 1) * stride + size;
  if (within + needs > view.length)
    throw fault(
      container,
      'gltf.accessor-out-of-range',
      pointer,
      `needs bytes ${within} to ${within + needs} of /bufferViews/${view.index}, which has ${view.length}. The count or the view is wrong; export the file again.`,
    );
  const strided = view.stride !== undefined;
  return {
    buffer: view.buffer,
    view: view.index,
    offset: view.offset + within,
    stride,
    size,
    count,
    strided,
  };
}

/** An optional whole number. What stands in its place and is none would move all that follows. */
function countOr(container: Container, json: Json, name: string, absent: number, pointer: string): number {
  const count = member(json, name) === undefined ? absent : countMember(json, name);
  if (count !== undefined) return count;
  const found = shown(member(json, name));
  throw fault(container, 'gltf.bad-view', `${pointer}/${name}`, `must be a whole number; it is ${found}.`);
}

interface View {
  readonly index: number;
  readonly buffer: number;
  readonly offset: number;
  readonly length: number;
  readonly stride?: number;
}

function viewOf(container: Container, json: Json, pointer: string): View {
  const views = listMember(container.json, 'bufferViews');
  const index = countMember(json, 'bufferView');
  const view = index === undefined ? undefined : views[index];
  if (index === undefined || view === undefined)
    throw fault(
      container,
      'gltf.no-view',
      `${pointer}/bufferView`,
      `is ${shown(member(json, 'bufferView'))}; there are ${views.length} buffer views.`,
    );
  const at = `/bufferViews/${index}`;
  refuseHidden(container, view, at);
  const buffer = countMember(view, 'buffer');
  const length = countMember(view, 'byteLength');
  const offset = countOr(container, view, 'byteOffset', 0, at);
  const buffers = listMember(container.json, 'buffers');
  refuseHidden(container, buffers[buffer ?? -1], `/buffers/${buffer}`);
  if (buffer === undefined || length === undefined || buffer >= buffers.length)
    throw fault(
      container,
      'gltf.bad-view',
      at,
      `needs a buffer below ${buffers.length} and a whole byteLength; it has ${shown(member(view, 'buffer'))} and ${shown(member(view, 'byteLength'))}.`,
    );
  const holds = countMember(buffers[buffer], 'byteLength') ?? 0;
  if (offset + length > holds)
    throw fault(
      container,
      'gltf.view-out-of-range',
      at,
      `spans bytes ${offset} to ${offset + length} of /buffers/${buffer}, which has ${holds}.`,
    );
  const stride =
    member(view, 'byteStride') === undefined ? undefined : countOr(container, view, 'byteStride', 0, at);
  return { index, buffer, offset, length, ...(stride !== undefined && { stride }) };
}

/** Extensions that put a view's bytes where the core text of glTF does not look. */
const COMPRESSIONS: readonly string[] = Object.freeze(['EXT_meshopt_compression', 'KHR_meshopt_compression']);

/**
 * What carries an extension that the file requires may mean something else than it says; so does a compressed view whose plain bytes
 * are not there.
 *
 * @throws AccessorFault `gltf.needs-extension`
 */
function refuseHidden(container: Container, json: Json | undefined, pointer: string): void {
  const extensions = member(json, 'extensions');
  const name = requiredExtension(container.json, json);
  if (name !== undefined)
    throw fault(
      container,
      'gltf.needs-extension',
      pointer,
      `is stored with ${name}, which the file requires and which is not read. Export it without that extension.`,
    );
  const compression = COMPRESSIONS.find((each) => isObject(member(extensions, each)));
  if (compression === undefined || member(json, 'buffer') === undefined) return;
  const fallback = countMember(json, 'buffer') ?? -1;
  const isThere =
    member(listMember(container.json, 'buffers')[fallback], 'uri') !== undefined ||
    (fallback === 0 && container.bin !== undefined);
  if (!isThere)
    throw fault(
      container,
      'gltf.needs-extension',
      pointer,
      `is compressed with ${compression}, which is not read, and its plain bytes are not in the file. Export it without that compression.`,
    );
}

type SparseRuns = NonNullable<AccessorLayout['sparse']>;

function sparseOf(
  container: Container,
  layout: Omit<AccessorLayout, 'run' | 'sparse'>,
  json: Json,
): SparseRuns | undefined {
  const sparse = member(json, 'sparse');
  if (sparse === undefined) return undefined;
  const pointer = `/accessors/${layout.index}/sparse`;
  const count = countMember(sparse, 'count');
  const indices = member(sparse, 'indices');
  const values = member(sparse, 'values');
  const indexType = countMember(indices, 'componentType') ?? -1;
  const indexBytes = [5121, 5123, 5125].includes(indexType) ? (COMPONENTS[indexType]?.bytes ?? 0) : 0;
  if (
    count === undefined ||
    count > layout.count ||
    !isObject(indices) ||
    !isObject(values) ||
    indexBytes === 0
  )
    throw fault(
      container,
      'gltf.bad-sparse',
      pointer,
      `needs a count of at most ${layout.count}, indices of an unsigned type and values; its count is ${shown(member(sparse, 'count'))}.`,
    );
  const { bytes } = layout.component;
  return {
    indexType,
    indices: runOf(container, indices, `${pointer}/indices`, count, indexBytes),
    values: runOf(container, values, `${pointer}/values`, count, layout.size * bytes),
  };
}
