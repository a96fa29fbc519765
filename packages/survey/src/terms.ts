import type { Word } from './word.js';

function term(name: string, summary: string, alsoCalled: readonly string[]): Word {
  return { kind: 'term', name, summary, alsoCalled };
}

/** Words of this project that name neither a rule nor an edit nor a playback, and what else people call the thing. */
export const TERMS: readonly Word[] = Object.freeze([
  term('key', 'An orientation that is stored at a time. Between two keys a playback decides.', [
    'keyframe',
    'animation key',
    'key pose',
  ]),
  term(
    'chart',
    'The page of one track: angular speed over time, folded into rows, with lanes for other quantities and findings in the margin.',
    ['curve editor', 'animation curve', 'speed plot', 'angular velocity', 'acceleration', 'jerk'],
  ),
  term('roster', 'The page, and the text, of all tracks: one row each, ranked by what is found.', [
    'track list',
    'overview',
  ]),
  term('docket', 'The report that is handed on: what was found, what was mended, what it cost.', [
    'report',
    'record',
    'summary',
  ]),
  term(
    'measure',
    'A function of the library, and the figures of every report: peak speed, worst step of speed, acceleration, angle travelled, noise floor.',
    [
      'angular velocity',
      'acceleration',
      'jerk',
      'total rotation',
      'angle travelled',
      'metrics',
      'smoothness',
    ],
  ),
  term('odometer', 'The angle that a track has travelled, turn by turn, never wrapped.', [
    'total rotation',
    'turn count',
    'unwrapped angle',
  ]),
  term(
    'porthole',
    'The round 3-D view beside the row of the cursor: the path on a globe, or the model at that moment.',
    ['motion path', 'in-betweens', '3-D view', '3D view', 'viewport', 'preview', 'trajectory'],
  ),
  term(
    'stamp',
    'A place of a finding that was accepted with a reason, kept in a small file beside the asset; it survives a re-export.',
    ['suppress', 'waive', 'ignore', 'accept', 'exception', 'false positive'],
  ),
  term(
    'baseline',
    'A file of the places that were known before: check --baseline FILE fails on new ones alone. --baseline-out FILE writes it.',
    ['suppress', 'ignore', 'known findings', 'legacy findings'],
  ),
  term(
    'house rules',
    'A project’s own limits, levels and exceptions, its loops, roles and declarations: check --rules FILE.',
    ['threshold', 'config', 'configuration', 'settings', 'limits', 'ignore', 'waive'],
  ),
  term(
    'declare',
    'Say in the house rules what is meant: cuts, holds, whips, spins and marks. Rules spare what is declared.',
    ['whip pan', 'declare whip', 'declare cut', 'hit', 'intended', 'marker'],
  ),
  term('noise floor', 'The speed below which nothing is claimed of a track: what its storage rounds.', [
    'quantisation noise',
    'quantization noise',
    'precision',
    'rounding',
  ]),
]);
