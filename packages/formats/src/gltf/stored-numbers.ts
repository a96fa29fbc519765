import { type AccessorLayout, COMPONENTS, FLOAT } from './accessor-layout.js';
import { canHold, decodeAccessor, encodeComponent } from './accessor-data.js';

/** Numbers as an accessor stores them. */
export interface StoredNumbers {
  readonly componentType: number;
  readonly normalized: boolean;
  readonly bytes: Uint8Array;
}

/** The numbers in the accessor's own component type, or in float32 where that can't hold them. */
export function storeNumbers(layout: AccessorLayout, numbers: Float64Array): StoredNumbers {
  const fits = numbers.every((number) => canHold(layout.component, number));
  const componentType = fits ? layout.componentType : FLOAT;
  const component = COMPONENTS[componentType] ?? layout.component;
  const bytes = new Uint8Array(numbers.length * component.bytes);
  const view = new DataView(bytes.buffer);
  numbers.forEach((number, i) => encodeComponent(component, view, i * component.bytes, number));
  return { componentType, normalized: fits && layout.normalized, bytes };
}

/** What a reader of the stored numbers gets back. */
export function readBack(layout: AccessorLayout, stored: StoredNumbers): Float64Array {
  const component = COMPONENTS[stored.componentType] ?? layout.component;
  const size = layout.size * component.bytes;
  const count = stored.bytes.byteLength / size;
  const run = { buffer: 0, view: 0, offset: 0, stride: size, size, count, strided: false };
  const { index, type } = layout;
  const { componentType, normalized } = stored;
  return decodeAccessor(
    { index, type, componentType, normalized, component, size: layout.size, count, run },
    () => stored.bytes,
  );
}

/** Least and greatest of each number of an element, as stored (integers not normalised); undefined where none is finite. */
export function boundsOf(
  layout: AccessorLayout,
  stored: StoredNumbers,
): { readonly min: readonly number[]; readonly max: readonly number[] } | undefined {
  const raw = readBack(layout, { ...stored, normalized: false });
  const min: number[] = Array.from({ length: layout.size }, () => Infinity);
  const max: number[] = min.map(() => -Infinity);
  raw.forEach((number, i) => {
    const part = i % layout.size;
    if (!Number.isFinite(number)) return;
    min[part] = Math.min(min[part] ?? number, number);
    max[part] = Math.max(max[part] ?? number, number);
  });
  return [...min, ...max].every(Number.isFinite) ? { min, max } : undefined;
}

/** Whether two lists hold the same numbers, NaN as equal to NaN and 0 as not equal to -0. */
export function sameNumbers(a: Float64Array, b: Float64Array): boolean {
  return a === b || (a.length === b.length && a.every((number, i) => Object.is(number, b[i])));
}
