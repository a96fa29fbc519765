export type { AnimationFile, OpenOptions } from './animation-file.js';
export type { PatchPlan, PatchRange } from './patch-plan.js';
export { bufferSource, type Source } from './source.js';
