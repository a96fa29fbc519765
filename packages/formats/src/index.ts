export type { AnimationFile, FileProblem, Follower, OpenOptions } from './animation-file.js';
export { checkPatchPlan, invertPatchPlan, patchedBytes, patchedSource } from './patched-source.js';
export { openAnimation } from './open.js';
export type { PatchPlan, PatchRange } from './patch-plan.js';
export { parsePatchPlan, patchPlanJson, type StoredPatchPlan } from './patch-plan-json.js';
export { jsonEditor, type JsonEditor, type JsonSpan, type JsonSplice } from './json-text.js';
export { lookAtTable, type TableLook, type TableSilence } from './delimited/table-look.js';
export type { AngleUnit, TableOptions } from './delimited/table-options.js';
export { bufferSource, type Source } from './source.js';
