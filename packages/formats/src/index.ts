export type { AnimationFile, FileProblem, OpenOptions } from './animation-file.js';
export { openAnimation } from './open.js';
export type { PatchPlan, PatchRange } from './patch-plan.js';
export { bufferSource, type Source } from './source.js';
