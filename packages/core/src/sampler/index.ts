export { poseSampler, type PoseSampler } from './pose-sampler.js';
export type { SamplerOptions } from './precision.js';
export { sampler, type Sampler } from './sampler.js';
export { squadSampler, type SquadSamplerOptions } from './squad-sampler.js';
