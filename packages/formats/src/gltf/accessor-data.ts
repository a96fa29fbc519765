import type { AccessorLayout, Component } from './accessor-layout.js';
import { COMPONENTS, type Run } from './accessor-layout.js';

/** Gives the bytes of a run: from its first element's first byte to its last element's last. */
export type RunBytes = (run: Run) => Uint8Array;

/** Bytes that a run spans, gaps between elements included. */
export function runLength(run: Run): number {
  return run.count === 0 ? 0 : (run.count - 1) * run.stride + run.size;
}

/**
 * An accessor's numbers in float64, element after element: zeros where it has no view, then what is sparse over it.
 * Normalised integers become c / top, not below -1 (glTF 2.0, "Animations": f = max(c / 32767.0, -1.0)).
 *
 * @throws RangeError where a sparse index is not below the count
 */
export function decodeAccessor(layout: AccessorLayout, bytesOf: RunBytes): Float64Array {
  const numbers = new Float64Array(layout.count * layout.size);
  if (layout.run) decodeRun(layout, layout.run, bytesOf(layout.run), numbers);
  if (layout.sparse) applySparse(layout, layout.sparse, bytesOf, numbers);
  return numbers;
}

function decodeRun(layout: AccessorLayout, run: Run, bytes: Uint8Array, out: Float64Array): void {
  const { component, size } = layout;
  const read = reader(component, layout.normalized, bytes);
  for (let element = 0; element < run.count; element++)
    for (let i = 0; i < size; i++) out[element * size + i] = read(element * run.stride + i * component.bytes);
}

function applySparse(
  layout: AccessorLayout,
  sparse: NonNullable<AccessorLayout['sparse']>,
  bytesOf: RunBytes,
  out: Float64Array,
): void {
  const indexComponent = COMPONENTS[sparse.indexType];
  if (!indexComponent) return;
  const { size } = layout;
  const readIndex = reader(indexComponent, false, bytesOf(sparse.indices));
  const values = new Float64Array(sparse.values.count * size);
  decodeRun(layout, sparse.values, bytesOf(sparse.values), values);
  for (let i = 0; i < sparse.indices.count; i++) {
    const element = readIndex(i * sparse.indices.stride);
    if (element >= layout.count)
      throw new RangeError(`sparse index ${i} is ${element}; there are ${layout.count} elements`);
    out.set(values.subarray(i * size, i * size + size), element * size);
  }
}

/** Whether sparse indices rise from one to the next, as glTF 2.0 asks. True where nothing is sparse. */
export function hasRisingIndices({ sparse }: AccessorLayout, bytesOf: RunBytes): boolean {
  const component = sparse && COMPONENTS[sparse.indexType];
  if (!component) return true;
  const { indices } = sparse;
  const readIndex = reader(component, false, bytesOf(indices));
  for (let i = 1; i < indices.count; i++)
    if (readIndex(i * indices.stride) <= readIndex((i - 1) * indices.stride)) return false;
  return true;
}

/** Reads one component at a byte offset. */
function reader(component: Component, normalized: boolean, bytes: Uint8Array): (at: number) => number {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const read = rawReader(component, view);
  if (!normalized || component.name === 'float32') return read;
  return (at) => Math.max(read(at) / component.top, -1);
}

function rawReader(component: Component, view: DataView): (at: number) => number {
  switch (component.name) {
    case 'int8':
      return (at) => view.getInt8(at);
    case 'uint8':
      return (at) => view.getUint8(at);
    case 'int16':
      return (at) => view.getInt16(at, true);
    case 'uint16':
      return (at) => view.getUint16(at, true);
    case 'uint32':
      return (at) => view.getUint32(at, true);
    default:
      return (at) => view.getFloat32(at, true);
  }
}

/** Whether a component can hold a number without losing more than its own rounding. */
export function canHold(component: Component, number: number): boolean {
  if (component.name === 'float32') return true;
  const lowest = component.name.startsWith('u') ? 0 : -1;
  const half = 0.5 / component.top;
  return number >= lowest - half && number <= 1 + half;
}

/** Writes one number at a byte offset, rounded as the component stores it: float32, or round(f · top) normalised. */
export function encodeComponent(component: Component, view: DataView, at: number, number: number): void {
  if (component.name === 'float32') {
    view.setFloat32(at, number, true);
    return;
  }
  const lowest = component.name.startsWith('u') ? 0 : -component.top;
  const stored = Math.min(Math.max(Math.round(number * component.top), lowest), component.top);
  switch (component.name) {
    case 'int8':
      return view.setInt8(at, stored);
    case 'uint8':
      return view.setUint8(at, stored);
    case 'int16':
      return view.setInt16(at, stored, true);
    case 'uint16':
      return view.setUint16(at, stored, true);
    default:
      return view.setUint32(at, stored, true);
  }
}
