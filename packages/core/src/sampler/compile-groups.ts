import { cubic } from './cubic.js';
import type { WriteGroup } from './group.js';
import { linearFloat32 } from './linear-float32.js';
import { linearFloat64 } from './linear-float64.js';
import type { SamplerOptions } from './precision.js';
import { groupBySharedTimes, type PlayedKeys } from './shared-times.js';
import { step } from './step.js';

/** One writer for all tracks of a kind that share their times. */
export function compileGroups(played: readonly PlayedKeys[], options: SamplerOptions): WriteGroup[] {
  const linear = options.precision === 'float32' ? linearFloat32 : linearFloat64;
  const compile = { STEP: step, LINEAR: linear, CUBICSPLINE: cubic };
  return groupBySharedTimes(played).map(({ interpolation, shared }) => compile[interpolation](shared));
}
