import { type RunBytes, decodeAccessor } from './accessor-data.js';
import { AccessorFault, type AccessorLayout } from './accessor-layout.js';
import type { Buffers } from './buffers.js';
import type { Container } from './container.js';

/** Gives an accessor's numbers, or throws the AccessorFault that hides them: `gltf.more-than-held`, `gltf.bad-sparse`. */
export type Decode = (layout: AccessorLayout, bytesOf: RunBytes) => Float64Array;

/**
 * Decodes within a budget, over all calls: views may overlap and accessors without a view hold nothing, so a small file could ask
 * for far more numbers than it has bytes.
 */
export function boundedDecoder(container: Container, buffers: Buffers): Decode {
  const budget = 65_536 + 2 * (container.source.size + buffers.opened());
  let left = budget;
  return (layout, bytesOf) => {
    const pointer = `/accessors/${layout.index}`;
    const place = { file: container.file, pointer };
    const numbers = layout.count * layout.size;
    if (numbers > left)
      throw new AccessorFault(
        'gltf.more-than-held',
        `${container.file}: ${pointer} asks for ${numbers} numbers; a file of ${container.source.size} bytes can have at most ${budget} in all. Its count is wrong.`,
        place,
      );
    left -= numbers;
    try {
      return decodeAccessor(layout, bytesOf);
    } catch (cause) {
      if (!(cause instanceof RangeError)) throw cause;
      throw new AccessorFault('gltf.bad-sparse', `${container.file}: ${pointer}: ${cause.message}.`, place, {
        cause,
      });
    }
  };
}
