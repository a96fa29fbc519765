export type { AnimationFile, FileProblem, OpenOptions } from './animation-file.js';
export { applyPatchPlan, checkPatchPlan, invertPatchPlan, patchedBytes } from './apply-patch-plan.js';
export { openAnimation } from './open.js';
export type { PatchPlan, PatchRange } from './patch-plan.js';
export { parsePatchPlan, patchPlanJson, type StoredPatchPlan } from './patch-plan-json.js';
export { jsonEditor, type JsonEditor, type JsonSpan, type JsonSplice } from './json-text.js';
export { bufferSource, type Source } from './source.js';
