import { SlewcurveError } from '@slewcurve/core';
import { CLAUSES, KEYS_PATTERN, readKeys } from './clauses.js';
import { VERBS, verbNamed } from './registry.js';
import type { Step } from './step.js';
import { timesInSeconds } from './times-in-seconds.js';
import type { Verb } from './verb.js';

/**
 * A step in plain English: "Lift out key 19 of Hips/Spine/Neck in Walk."
 *
 * @throws SlewcurveError `card.unknown-verb`
 */
export function sayStep(step: Step): string {
  return verbNamed(step.verb).say(step);
}

/**
 * The step that a sentence says; undoes `sayStep`. The final full stop may be left out and the first word may begin small. Times may be seconds, or as
 * frames or timecode ("between frame 15 and 00:00:01:00") where the clip's frames per second are given.
 *
 * @throws SlewcurveError `sentence.unknown-opening`, `sentence.unreadable`, and what `readTime` throws of a frame
 */
export function parseSentence(text: string, fps?: number): Step {
  const sentence = text.trim().replace(/\.$/, '');
  const verb = verbOpening(sentence);
  let rest = sentence.slice(verb.opening.length);
  const keys = KEYS_PATTERN.exec(rest);
  if (!keys) throw unreadable(rest, 'the keys, as "key 19 of", "keys 3 and 5 of" or "all keys of"');
  rest = rest.slice(keys[0].length);
  const [track, afterTrack] = takeName(rest);
  if (!afterTrack.startsWith(' in ')) throw unreadable(afterTrack, '" in " and the name of the clip');
  const [clip, afterClip] = takeName(afterTrack.slice(4));
  rest = timesInSeconds(afterClip, fps);
  let step: Step = {
    verb: verb.name,
    clip,
    track,
    ...(keys[2] !== undefined && { keys: readKeys(keys[2]) }),
  };
  for (const clause of CLAUSES) {
    const match = clause.pattern.exec(rest);
    if (!match) continue;
    step = { ...step, ...clause.read(match.slice(1)) };
    rest = rest.slice(match[0].length);
  }
  if (rest !== '') throw unreadable(rest, 'the end of the sentence');
  return step;
}

function verbOpening(sentence: string): Verb {
  const small = sentence.toLowerCase();
  const verb = VERBS.find(({ opening }) => small.startsWith(`${opening.toLowerCase()} `));
  if (verb) return verb;
  throw new SlewcurveError(
    'sentence.unknown-opening',
    `No edit begins with "${sentence.slice(0, 40)}". Begin with one of: ${VERBS.map(({ opening }) => opening).join(', ')}.`,
  );
}

/** A name from the start of `text`, bare or as a JSON string, and what follows it. */
function takeName(text: string): [string, string] {
  const quoted = /^"(?:[^"\\]|\\.)*"/.exec(text);
  const bare = quoted ?? /^[^\s",]+/.exec(text);
  if (!bare) throw unreadable(text, 'a name');
  const rest = text.slice(bare[0].length);
  if (!quoted) return [bare[0], rest];
  try {
    return [String(JSON.parse(quoted[0])), rest];
  } catch (cause) {
    throw unreadable(text, 'a name in double quotes as JSON writes it', cause);
  }
}

function unreadable(rest: string, wanted: string, cause?: unknown): SlewcurveError {
  const message = `At "${rest.slice(0, 60)}" the sentence should have ${wanted}.`;
  return new SlewcurveError('sentence.unreadable', message, {}, { cause });
}
