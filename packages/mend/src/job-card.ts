import { type RotationTrack, type SceneNode, SlewcurveError } from '@slewcurve/core';
import { follow } from './pace/follow.js';
import { matchesPattern } from './pattern.js';
import { verbNamed } from './registry.js';
import type { Step } from './step.js';
import { readStep } from './read-step.js';
import type { EditResult, EditScene } from './verb.js';

/** An ordered list of edits that can be run again, as REPORT writes it: flat JSON. */
export interface JobCard {
  readonly schemaVersion: 1;
  /** The file that it was written for. */
  readonly for?: { readonly file: string; readonly sha256: string };
  readonly steps: readonly Step[];
}

/** What one step did to one of the tracks that it names. */
export interface AppliedStep {
  readonly step: Step;
  /** Index of the step in the card, and of the track in the list. */
  readonly number: number;
  readonly index: number;
  /** The track as this step found it. */
  readonly before: RotationTrack;
  readonly result: EditResult;
}

/**
 * A job card from parsed JSON of any origin. Keys that the card itself does not know are passed over; in a step they are refused, as
 * passing over an instruction would do another edit than the one asked for.
 *
 * @throws SlewcurveError `card.bad-shape`, `card.bad-version`, `card.unknown-verb`, `card.bad-number`, `card.bad-text`,
 * `card.unknown-key`; the place is a JSON pointer into the card.
 */
export function parseJobCard(json: unknown): JobCard {
  if (!isRecord(json)) throw new SlewcurveError('card.bad-shape', 'A job card is a JSON object.');
  if (json['schemaVersion'] !== 1)
    throw new SlewcurveError(
      'card.bad-version',
      `schemaVersion must be 1; it is ${JSON.stringify(json['schemaVersion']) ?? 'missing'}.`,
      { pointer: '/schemaVersion' },
    );
  const { steps } = json;
  if (!Array.isArray(steps))
    throw new SlewcurveError('card.bad-shape', 'steps must be a list.', { pointer: '/steps' });
  return {
    schemaVersion: 1,
    ...(json['for'] !== undefined && { for: readFor(json['for']) }),
    steps: steps.map((step: unknown, index) => readStep(step, index)),
  };
}

/**
 * Runs steps in order over a list of tracks. `clip` and `track` of a step are patterns (`*` stands for anything); one that a track
 * has as its very name means that name alone. Tracks that no step names stay the same objects, but for those that a pace takes along: `with: "clip"`.
 *
 * @param nodes the file's node tree, for edits that look at parents
 * @throws SlewcurveError `step.no-match`, `step.many-clocks`, `step.whole-file` and what the verbs throw, with the step's number in the message; the given tracks are never
 * written, so nothing is half done.
 */
export function applySteps(
  tracks: readonly RotationTrack[],
  steps: readonly Step[],
  nodes: readonly SceneNode[] = [],
): { readonly tracks: readonly RotationTrack[]; readonly results: readonly AppliedStep[] } {
  const current = [...tracks];
  const results = steps.flatMap((step, number) => {
    const verb = verbNamed(step.verb, { pointer: `/steps/${number}/verb` });
    const found = tracksNamed(current, step, number);
    checkOneClock(step, number, found.length);
    if (verb.wholeFile === true) checkWholeFile(step, number, found.length, current.length);
    const scene: EditScene = {
      nodes,
      tracks: [...current],
      named: found.map((index) => current[index]),
    };
    const run = (index: number, edit: (before: RotationTrack) => EditResult): AppliedStep => {
      const before = current[index];
      const result = saysWhichStep(number, step, () => edit(before));
      current[index] = result.track;
      return { step, number, index, before, result };
    };
    const applied = found.map((index) => run(index, (before) => verb.apply(before, step, scene)));
    const { repaced } = applied[0].result;
    if (repaced?.with !== 'clip') return applied;
    const others = [...current.keys()].filter((index) => current[index].clip === current[found[0]].clip);
    const following = others.filter((index) => index !== found[0]);
    return [...applied, ...following.map((index) => run(index, (before) => follow(before, repaced, step)))];
  });
  return { tracks: current, results };
}

/** A clip goes by one clock. @throws SlewcurveError `step.many-clocks` */
function checkOneClock(step: Step, number: number, count: number): void {
  if (step.with !== 'clip' || count === 1) return;
  throw new SlewcurveError(
    'step.many-clocks',
    `Step ${number + 1} (${step.verb}) names ${count} tracks, and a clip can go by the clock of one alone. Name that one, or take only their nodes along.`,
    { clip: step.clip, track: step.track, pointer: `/steps/${number}` },
  );
}

/** @throws SlewcurveError `step.whole-file` */
function checkWholeFile(step: Step, number: number, count: number, all: number): void {
  if (count === all) return;
  throw new SlewcurveError(
    'step.whole-file',
    `Step ${number + 1} (${step.verb}) names ${count} of ${all} tracks, and single tracks would no longer fit the rest. Name them all: * in *.`,
    { clip: step.clip, track: step.track, pointer: `/steps/${number}` },
  );
}

function tracksNamed(tracks: readonly RotationTrack[], step: Step, number: number): number[] {
  const place = { clip: step.clip, track: step.track, pointer: `/steps/${number}` };
  const inClip = named(
    tracks.map((_, index) => index),
    step.clip,
    (index) => tracks[index].clip,
  );
  if (inClip.length === 0)
    throw new SlewcurveError(
      'step.no-match',
      `Step ${number + 1} (${step.verb}): no clip fits "${step.clip}".`,
      place,
    );
  const found = named(inClip, step.track, (index) => tracks[index].id);
  if (found.length === 0)
    throw new SlewcurveError(
      'step.no-match',
      `Step ${number + 1} (${step.verb}): no track of clip "${step.clip}" fits "${step.track}".`,
      place,
    );
  return found;
}

function named(indices: readonly number[], pattern: string, nameOf: (index: number) => string): number[] {
  const same = pattern === '*' ? [] : indices.filter((index) => nameOf(index) === pattern);
  return same.length > 0 ? same : indices.filter((index) => matchesPattern(pattern, nameOf(index)));
}

function saysWhichStep<T>(number: number, step: Step, run: () => T): T {
  try {
    return run();
  } catch (error) {
    if (!(error instanceof SlewcurveError)) throw error;
    throw new SlewcurveError(
      error.code,
      `Step ${number + 1} (${step.verb}) on ${error.place.track ?? step.track}: ${error.message}`,
      { ...error.place, pointer: `/steps/${number}` },
      { cause: error },
    );
  }
}

function readFor(json: unknown): { file: string; sha256: string } {
  const pointer = '/for';
  if (!isRecord(json)) throw new SlewcurveError('card.bad-shape', '"for" must be an object.', { pointer });
  const { file, sha256 } = json;
  if (typeof file !== 'string' || typeof sha256 !== 'string')
    throw new SlewcurveError('card.bad-text', '"for" needs file and sha256, both text.', { pointer });
  return { file, sha256 };
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
