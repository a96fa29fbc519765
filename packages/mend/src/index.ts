export { nearestWord } from './nearest-word.js';
export type { Step } from './step.js';
export type { EditResult, Verb } from './verb.js';
