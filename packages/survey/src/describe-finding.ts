import { angleBetween, keyOrientation, type RotationTrack } from '@slewcurve/core';
import { findingFingerprint, occurrenceFingerprint } from './fingerprint.js';
import type { Finding, Level, Occurrence, Way } from './finding.js';
import type { Limits, Place, Remedy, Rule, TrackContext } from './rule.js';
import { seenDegrees } from './seen-degrees.js';
import { significant } from './significant.js';
import type { VisibleEffect } from './visible-effect.js';

/** Places of a finding that are listed; the rest is counted. */
const MOST_OCCURRENCES = 100;

/** The track that places are described of. */
export interface Subject {
  readonly context: TrackContext;
  /** Numbers in the stored track of the keys of `context.track`; undefined where they are the same. */
  readonly keys: Int32Array | undefined;
  readonly frameRate: number | undefined;
  /** The playback named where a rule names none. */
  readonly playback: string;
  /** What an offset of the track is seen as, degrees; undefined where it can't be told. */
  effect(degrees: number): VisibleEffect | undefined;
}

const DEGREES = 180 / Math.PI;
const SEVERITY: Readonly<Record<Level, number>> = { error: 2, warning: 1, note: 0 };
/** Keys on either side of a place's own that belong to its spot. */
const SPOT = 3;

/** One finding from all places of a rule on a track, the worst first; `places` is not empty and in the order of keys. */
export function describeFinding(
  rule: Rule,
  places: readonly Place[],
  limits: Limits,
  subject: Subject,
): Finding {
  const { clip, id: track } = subject.context.stored;
  const fingerprints = fingerprintsOf(rule, places, subject);
  const ranked = places.map((place, index) => ({ place, index }));
  ranked.sort(
    (a, b) => severity(b.place) - severity(a.place) || excess(b.place) - excess(a.place) || a.index - b.index,
  );
  // Key numbers on a card are those of the stored track; a remedy for a track with holes waits until the holes are mended.
  const sound = rule.reads === 'stored' || subject.keys === undefined;
  const limit = significant(ranked[0]!.place.limit);
  const playback = ranked[0]!.place.playback ?? subject.playback;
  const described = ranked.slice(0, MOST_OCCURRENCES).map(({ place, index }) => {
    const remedy = sound ? rule.remedy(subject.context, place, limits) : undefined;
    const shown = renumbered(rule, place, subject);
    const own = occurrence(rule, shown, remedy, fingerprints(index), subject);
    const others = {
      ...(significant(place.limit) !== limit && { limit: significant(place.limit) }),
      ...((place.playback ?? subject.playback) !== playback && {
        playback: place.playback ?? subject.playback,
      }),
    };
    return { remedy, occurrence: { ...own, ...others } };
  });
  const worst = described[0]!;
  const { fingerprint: _, level, ...numbers } = worst.occurrence;
  return {
    rule: rule.id,
    level,
    clip,
    track,
    ...numbers,
    unit: rule.unit,
    limit,
    playback,
    owner: track,
    ...effectOf(rule, ranked[0]!.place, subject),
    count: places.length,
    occurrences: described.map((one) => one.occurrence),
    ...(worst.remedy !== undefined && { untouched: rule.untouched }),
    fingerprint: findingFingerprint(rule.id, clip, track),
  };
}

function effectOf(rule: Rule, worst: Place, subject: Subject): Pick<Finding, 'effect'> {
  const degrees = seenDegrees(rule, worst);
  const effect = degrees === undefined ? undefined : subject.effect(degrees);
  return effect === undefined ? {} : { effect };
}

function severity(place: Place): number {
  return SEVERITY[place.level];
}

/** How far beyond its limit a place is, on whichever side that lies; rounded, so that equal places keep the order of keys. */
function excess({ value, limit }: Place): number {
  return Number(Math.abs(value - limit).toPrecision(5));
}

function renumbered(rule: Rule, place: Place, { keys }: Subject): Place {
  if (rule.reads === 'stored' || keys === undefined) return place;
  return { ...place, keys: place.keys.map((key) => keys[key] ?? key) };
}

function occurrence(
  rule: Rule,
  place: Place,
  remedy: Remedy | undefined,
  fingerprint: string,
  { frameRate }: Subject,
): Occurrence {
  const { keys, time, span, value, level, confidence, ways } = place;
  return {
    keys,
    time,
    ...(frameRate !== undefined && { frame: significant(time * frameRate) }),
    span,
    value: significant(value),
    level,
    ...(confidence !== undefined && { confidence: significant(confidence) }),
    ...(remedy !== undefined && { remedy: remedy.step }),
    ...(remedy?.price !== undefined && { price: significant(remedy.price) }),
    ...(remedy?.alternatives !== undefined && { alternatives: remedy.alternatives }),
    ...(ways !== undefined && { ways: ways.map(roundedWay) }),
    message: rule.message(place, remedy),
    fingerprint,
  };
}

function roundedWay({ axis: [x, y, z], angle }: Way): Way {
  return { axis: [significant(x), significant(y), significant(z)], angle: significant(angle) };
}

/**
 * Fingerprint of a place by its index. Equal ones on one track are numbered in the order of keys, over all places, listed or not: the
 * first stands bare, the second ends in `-2`.
 */
function fingerprintsOf(rule: Rule, places: readonly Place[], subject: Subject): (index: number) => string {
  const { stored, track: playable } = subject.context;
  const track = rule.reads === 'stored' ? stored : playable;
  const seen = new Map<string, number>();
  const numbers = places.map((place) => {
    const change = turnAcross(track, place);
    const alike = `${place.value.toPrecision(2)} ${change.toFixed(0)}`;
    const number = (seen.get(alike) ?? 0) + 1;
    seen.set(alike, number);
    return { change, number };
  });
  return (index) => {
    const { change = 0, number = 1 } = numbers[index] ?? {};
    const print = occurrenceFingerprint(rule.id, stored.clip, stored.id, places[index]?.value ?? 0, change);
    return number === 1 ? print : `${print}-${number}`;
  };
}

/** Angle from three keys before a place's first key to three after its last, degrees; the track's ends where it is too short. */
function turnAcross(track: RotationTrack, { keys }: Place): number {
  const before = Math.max(0, (keys[0] ?? 0) - SPOT);
  const after = Math.min(track.times.length - 1, (keys.at(-1) ?? 0) + SPOT);
  const from = keyOrientation(new Float64Array(4), track, before);
  return angleBetween(from, keyOrientation(new Float64Array(4), track, after)) * DEGREES;
}
