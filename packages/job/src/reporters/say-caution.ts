import type { Caution } from '../cautions.js';
import { counted } from './say-verdict.js';

/** "caution, 2 tracks of role machine: Check limits …" */
export function sayCaution({ role, tracks, message }: Caution): string {
  return `caution, ${counted(tracks, 'track')} of role ${role}: ${message}`;
}
