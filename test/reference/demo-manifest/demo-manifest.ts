// An independent reading of the demo scene: which rule finds what, worked out from the rules' text with reader and maths of its own.
// It imports nothing of the packages that it judges.
import type { Entry } from './entry.js';
import { jumps } from './jumps.js';
import { interruptions } from './interruptions.js';
import { paces } from './paces.js';
import { readScene, type Rules } from './read-scene.js';
import { seams } from './seams.js';
import { shakes } from './shakes.js';
import { storedNumbers } from './stored-numbers.js';
import { waysRound } from './ways-round.js';

/** The rules that are worked out; of every other rule nothing is said. */
export const WORKED_OUT: readonly string[] = [
  'file.not-finite',
  'file.not-normalised',
  'file.time-order',
  'file.coarse',
  'file.idle',
  'file.ragged',
  // No clip of the demo has ten tracks, and none has tracks of angles.
  'file.component-order',
  'file.degrees-or-radians',
  'file.axes-suspect',
  // The demo’s nodes have no matrices.
  'file.mirror-matrix',
  // The demo is no capture’s text.
  'file.hole',
  'file.time-grid',
  'turn.sign-flip',
  'turn.half',
  'turn.lost',
  // The demo has no angle tracks.
  'turn.wrap',
  'turn.euler-flip',
  'turn.gimbal',
  'turn.long-way',
  'jump.lone-key',
  'jump.shelf',
  'jump.first-key',
  'jump.cut-smear',
  'jump.freeze',
  'jump.turned-over',
  'pace.elbow',
  'pace.hard-stop',
  'pace.axis-kick',
  // The demo has no CUBICSPLINE tracks.
  'pace.tangent-scale',
  'pace.end-tangent',
  'pace.pearls',
  'pace.overrun',
  'pace.lurch',
  'pace.cubic-collapse',
  // No playback by chords is chosen.
  'pace.bow',
  'pace.comb',
  'pace.reverse',
  'shake.grain',
  'shake.hum',
  'shake.creep',
  'seam.loop-gap',
  'seam.loop-kink',
  'seam.doubled-end',
  // The demo’s house rules declare no joins or blends.
  'seam.join',
  'seam.blend-side',
  'limit.speed',
  // The demo's house rules give no limit of acceleration or jerk.
  'limit.accel',
  'limit.jerk',
  'limit.picture',
  // The demo’s house rules ask for no share of keys.
  'keys.too-many',
  'horizon.roll',
  'horizon.overhead',
];

/** Every finding at note or above that those rules make on the scene, under the given house rules, played as written. */
export function demoManifest(bytes: Uint8Array, rules: Rules): Entry[] {
  return readScene(bytes, rules).flatMap((track) => {
    const stored = storedNumbers(track);
    const isCoarse = stored.some(({ rule }) => rule === 'file.coarse');
    const jumped = jumps(track, isCoarse);
    const claimed = jumped.flatMap(({ keys }) => keys);
    return [
      ...stored,
      ...waysRound(track),
      ...jumped,
      ...shakes(track, isCoarse),
      ...paces(track, isCoarse),
      ...(isCoarse ? [] : interruptions(track, claimed)),
      ...seams(track),
    ];
  });
}
