export type { Finding, Level, Occurrence, Way } from './finding.js';
