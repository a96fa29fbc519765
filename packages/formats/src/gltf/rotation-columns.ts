import { VALUES_PER_KEY } from '@slewcurve/core';
import { type AccessorLayout, AccessorFault, FLOAT, accessorLayout } from './accessor-layout.js';
import { hasRisingIndices } from './accessor-data.js';
import { boundedDecoder } from './bounded-decoder.js';
import type { Buffers } from './buffers.js';
import type { Container } from './container.js';
import type { RotationChannel } from './rotation-channel.js';
import { readRuns } from './run-reader.js';

/** Times and values of one channel, with how they are stored. */
export interface Columns {
  readonly times: Float64Array;
  readonly values: Float64Array;
  readonly input: AccessorLayout;
  readonly output: AccessorLayout;
  /** Those of the two accessors whose sparse indices don't rise. */
  readonly unsorted: readonly number[];
}

/** Gives a channel's columns, or throws the AccessorFault that hides them. */
export type ColumnsOf = (channel: RotationChannel) => Columns;

/**
 * Reads the accessors of all channels: layouts first, then the bytes in few reads, then each accessor once. Accessors that
 * several samplers share are decoded once and shared.
 */
export async function readColumns(
  container: Container,
  channels: readonly RotationChannel[],
  buffers: Buffers,
): Promise<ColumnsOf> {
  const layouts = new Map<number, AccessorLayout | AccessorFault>();
  for (const index of channels.flatMap(({ input, output }) => [input, output]))
    if (!layouts.has(index))
      layouts.set(
        index,
        attempt(() => accessorLayout(container, index)),
      );
  const fits = attemptAll(container, channels, layouts);
  const wanted = new Set([...fits.values()].flatMap(({ input, output }) => [input, output]));
  const runs = [...wanted].flatMap(({ run, sparse }) => [
    ...(run ? [run] : []),
    ...(sparse ? [sparse.indices, sparse.values] : []),
  ]);
  const bytesOf = await readRuns(runs, buffers, container.file);
  const decode = boundedDecoder(container, buffers);
  const decoded = new Map<AccessorLayout, Float64Array | AccessorFault>();
  const outOfOrder = new Set<number>();
  for (const layout of wanted)
    decoded.set(
      layout,
      attempt(() => {
        const numbers = decode(layout, bytesOf);
        if (!hasRisingIndices(layout, bytesOf)) outOfOrder.add(layout.index);
        return numbers;
      }),
    );
  return (channel) => {
    const { input, output } = fits.get(channel) ?? checkedPair(container, channel, layouts);
    const unsorted = [input, output].filter(({ index }) => outOfOrder.has(index)).map(({ index }) => index);
    return { input, output, unsorted, times: ready(decoded.get(input)), values: ready(decoded.get(output)) };
  };
}

interface Pair {
  readonly input: AccessorLayout;
  readonly output: AccessorLayout;
}

type Layouts = ReadonlyMap<number, AccessorLayout | AccessorFault>;

function attemptAll(
  container: Container,
  channels: readonly RotationChannel[],
  layouts: Layouts,
): Map<RotationChannel, Pair> {
  const pairs = new Map<RotationChannel, Pair>();
  for (const channel of channels) {
    const pair = attempt(() => checkedPair(container, channel, layouts));
    if (!(pair instanceof AccessorFault)) pairs.set(channel, pair);
  }
  return pairs;
}

/**
 * Types and counts as glTF 2.0 asks of a rotation's sampler ("Animations", tables of accessor types).
 *
 * @throws AccessorFault `gltf.time-type`, `gltf.value-type`, `gltf.count-mismatch`, and what hides either accessor
 */
function checkedPair(container: Container, channel: RotationChannel, layouts: Layouts): Pair {
  const input = ready(layouts.get(channel.input));
  const output = ready(layouts.get(channel.output));
  const fault = (code: string, index: number, what: string): AccessorFault => {
    const pointer = `/accessors/${index}`;
    return new AccessorFault(code, `${container.file}: ${pointer} ${what}`, {
      file: container.file,
      pointer,
    });
  };
  if (input.type !== 'SCALAR' || input.componentType !== FLOAT)
    throw fault(
      'gltf.time-type',
      input.index,
      `holds times, which are float SCALAR; it is ${described(input)}.`,
    );
  const stored = output.componentType === FLOAT || (output.normalized && output.component.bytes < 4);
  if (output.type !== 'VEC4' || !stored)
    throw fault(
      'gltf.value-type',
      output.index,
      `holds rotations, which are VEC4 of float or of normalised byte or short; it is ${described(output)}.`,
    );
  const perKey = VALUES_PER_KEY[channel.interpolation] / 4;
  if (output.count !== input.count * perKey)
    throw fault(
      'gltf.count-mismatch',
      output.index,
      `holds ${output.count} rotations; ${input.count} times under ${channel.interpolation} need ${input.count * perKey}.`,
    );
  return { input, output };
}

function described(layout: AccessorLayout): string {
  return `${layout.normalized ? 'normalised ' : ''}${layout.component.name} ${layout.type}`;
}

function attempt<T>(make: () => T): T | AccessorFault {
  try {
    return make();
  } catch (error) {
    if (error instanceof AccessorFault) return error;
    throw error;
  }
}

function ready<T>(found: T | AccessorFault | undefined): T {
  if (found instanceof AccessorFault) throw found;
  if (found === undefined) throw new Error('an accessor was asked for that was never read');
  return found;
}
