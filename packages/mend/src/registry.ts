import { type ErrorPlace, SlewcurveError } from '@slewcurve/core';
import { bridge } from './edits/bridge.js';
import { cap } from './edits/cap.js';
import { chooseSide } from './edits/choose-side.js';
import { closeLoop } from './edits/close-loop.js';
import { copyPace } from './edits/copy-pace.js';
import { easeInOut } from './edits/ease-in-out.js';
import { easeThrough } from './edits/ease-through.js';
import { evenOut } from './edits/even-out.js';
import { hold } from './edits/hold.js';
import { layOver } from './edits/lay-over.js';
import { liftOut } from './edits/lift-out.js';
import { match } from './edits/match.js';
import { normaliseKeys } from './edits/normalise.js';
import { reSeat } from './edits/re-seat.js';
import { reverse } from './edits/reverse.js';
import { sameSide } from './edits/same-side.js';
import { setMarks } from './edits/set-marks.js';
import { shape } from './edits/shape.js';
import { smooth } from './edits/smooth.js';
import { shrink, stretch } from './edits/stretch.js';
import { takeOutDrift } from './edits/take-out-drift.js';
import { takeOutHum } from './edits/take-out-hum.js';
import { thereAndBack } from './edits/there-and-back.js';
import { trim } from './edits/trim.js';
import { wholeTurns } from './edits/whole-turns.js';
import { changeSpace } from './edits/change-space.js';
import { convert } from './edits/convert.js';
import { mirror } from './edits/mirror.js';
import { reGrid } from './edits/re-grid.js';
import { reTimeToGrid } from './edits/re-time-to-grid.js';
import { restate } from './edits/restate.js';
import { setTangents } from './edits/set-tangents.js';
import { sortTimes } from './edits/sort-times.js';
import { unwrap } from './edits/unwrap.js';
import { nearestWord } from './nearest-word.js';
import { onAngles } from './on-angles.js';
import type { Verb } from './verb.js';

/** Every edit that is built. */
export const VERBS: readonly Verb[] = Object.freeze([
  sameSide,
  chooseSide,
  onAngles(liftOut),
  onAngles(bridge),
  onAngles(reSeat),
  normaliseKeys,
  onAngles(takeOutHum),
  onAngles(smooth),
  onAngles(takeOutDrift),
  onAngles(closeLoop),
  onAngles(layOver),
  easeInOut,
  evenOut,
  cap,
  shape,
  copyPace,
  match,
  hold,
  setMarks,
  stretch,
  shrink,
  reverse,
  thereAndBack,
  easeThrough,
  wholeTurns,
  trim,
  sortTimes,
  reTimeToGrid,
  reGrid,
  convert,
  setTangents,
  unwrap,
  restate,
  changeSpace,
  mirror,
]);

/**
 * The edit of this name.
 *
 * @throws SlewcurveError `card.unknown-verb`; the message says which edit may be meant.
 */
export function verbNamed(name: string, place: ErrorPlace = {}): Verb {
  const verb = VERBS.find((candidate) => candidate.name === name);
  if (verb) return verb;
  const meant = verbMeant(name);
  const hint = meant
    ? `Did you mean "${meant.name}"?`
    : `There are: ${VERBS.map((candidate) => candidate.name).join(', ')}.`;
  throw new SlewcurveError('card.unknown-verb', `"${name.slice(0, 60)}" is no edit. ${hint}`, place);
}

/** The edit whose name, or whose name in the trade, is spelt nearly so. */
function verbMeant(name: string): Verb | undefined {
  if (name.length > 60) return undefined;
  const words = new Map(VERBS.flatMap((verb) => [verb.name, ...verb.alsoCalled].map((word) => [word, verb])));
  const nearest = nearestWord(name.replace(/[-_]/g, ' '), [...words.keys()]);
  return nearest === undefined ? undefined : words.get(nearest);
}
