import {
  PLAYBACKS,
  SlewcurveError,
  playableTrack,
  regime,
  replaceTrack,
  type Clip,
  type PlaybackId,
  type RotationTrack,
  type SceneNode,
} from '@slewcurve/core';
import { matchesPattern } from '@slewcurve/mend';
import { claimSpots, type Found } from './claim-order.js';
import { withDeclaredCuts } from './declared-cuts.js';
import { describeFinding, type Subject } from './describe-finding.js';
import type { Finding } from './finding.js';
import { NO_HOUSE_RULES, levelAt, limitsAt, roleIn, type Address, type HouseRules } from './house-rules.js';
import { declaredHere, isExcused } from './declared-here.js';
import { keptKeys } from './kept-keys.js';
import { latticeOf } from './lattice.js';
import { RULES } from './registry.js';
import type { Limits, PlayedTrack, Rule, TrackContext } from './rule.js';
import { visibleEffect } from './visible-effect.js';

/** What a survey goes by, apart from the track itself. */
export interface SurveySettings {
  /** How the file will be played; the worst counts. Default: as written. */
  readonly playbacks?: readonly PlaybackId[];
  readonly houseRules?: HouseRules;
  /** The file's name, for exceptions of the house rules. */
  readonly file?: string;
}

/** Where a track stands. */
export interface TrackSurveySettings extends SurveySettings {
  /** The clip that the track is of; its grid, its loop and its other tracks count. */
  readonly clip?: Clip;
  /** All clips of the file, for what is declared between two of them. */
  readonly clips?: readonly Clip[];
  /** The file's node tree, from which the role comes. */
  readonly nodes?: readonly SceneNode[];
  /** Metres in one unit of the node tree; left out: not known, and nothing is told in millimetres. */
  readonly metres?: number;
}

/** Findings of every track of a clip, track by track. */
export function surveyClip(
  clip: Clip,
  nodes: readonly SceneNode[],
  settings: SurveySettings = {},
): Finding[] {
  return clip.tracks.flatMap((track) => surveyTrack(track, { ...settings, clip, nodes }));
}

/**
 * What every rule finds on one track: at most one finding a rule, its worst place first. Keys that can't be played are found by the
 * rules of family `file`; all other rules look at the track without them, and then offer no remedy, as that must wait for sound keys.
 */
export function surveyTrack(stored: RotationTrack, settings: TrackSurveySettings = {}): Finding[] {
  const house = settings.houseRules ?? NO_HOUSE_RULES;
  const address: Address = { file: settings.file ?? '', clip: stored.clip, track: stored.id };
  const context = contextOf(stored, settings, house, address);
  const found: Found[] = [];
  const limitsOf = new Map<Rule, Limits>();
  for (const rule of RULES) {
    if (levelAt(house, rule.id, address) === 'off') continue;
    const limits = context.limits(rule.id);
    if (limits === undefined) continue;
    limitsOf.set(rule, limits);
    const places = rule.find(context, limits).filter((place) => !isExcused(rule, place, context));
    if (places.length > 0) found.push({ rule, places });
  }
  const keys = context.track === context.stored ? undefined : keptKeys(context.stored, context.track);
  const subject: Subject = {
    context,
    keys,
    frameRate: settings.clip?.frameRate,
    playback: context.played[0]?.playback.id ?? 'as-written',
    effect: (degrees) => visibleEffect(degrees, settings.nodes ?? [], stored.source.node, settings.metres),
  };
  return claimSpots(found).flatMap(({ rule, places }) => {
    const level = levelAt(house, rule.id, address);
    const decreed =
      level === undefined || level === 'off' ? places : places.map((place) => ({ ...place, level }));
    return decreed.length === 0 ? [] : [describeFinding(rule, decreed, limitsOf.get(rule) ?? {}, subject)];
  });
}

const RULE_BY_ID: ReadonlyMap<string, Rule> = new Map(RULES.map((rule) => [rule.id, rule]));

function contextOf(
  track: RotationTrack,
  settings: TrackSurveySettings,
  house: HouseRules,
  address: Address,
): TrackContext {
  const { clip = alone(track), nodes = [], playbacks = ['as-written'] } = settings;
  const role = roleIn(house, track, nodes);
  const stored = withLattice(withDeclaredCuts(track, house));
  const playable = playableTrack(stored);
  return {
    stored,
    track: playable,
    role,
    regime: regime(playable, clip.frameRate),
    clip,
    nodes,
    ...viewOf(nodes[track.source.node]),
    declared: declaredHere(track, clip, house, settings.clips),
    loop: clip.loop || house.loops.some((pattern) => matchesPattern(pattern, track.clip)),
    played: playable.times.length === 0 ? [] : playbacks.flatMap((id) => played(playable, id)),
    limits: (id) => {
      const rule = RULE_BY_ID.get(id);
      return rule === undefined ? undefined : limitsAt(house, rule, role, address);
    },
  };
}

/** A camera that does not say how wide its picture is has 16 to 9. */
const USUAL_ASPECT = 16 / 9;

function viewOf(node: SceneNode | undefined): { readonly view?: number } {
  if (node?.camera === undefined) return {};
  const { verticalView, aspect = USUAL_ASPECT } = node.camera;
  return { view: 2 * Math.atan(aspect * Math.tan(verticalView / 2)) };
}

/** The track under one playback; nothing where it needs what the track has not. */
function played(track: RotationTrack, id: PlaybackId): PlayedTrack[] {
  const playback = PLAYBACKS[id];
  try {
    const holds = id === 'step' || track.interpolation === 'STEP';
    return [{ playback, curve: playback.play(track), holds }];
  } catch (error) {
    if (error instanceof SlewcurveError) return [];
    throw error;
  }
}

/** The track, its storage as coarse as its values show: nothing finer is claimed of it. */
function withLattice(track: RotationTrack): RotationTrack {
  const lattice = latticeOf(track);
  if (lattice === 0 || track.storage.lattice !== undefined) return track;
  return replaceTrack(track, { storage: { ...track.storage, lattice } });
}

/** A clip that holds nothing but one track. */
function alone(track: RotationTrack): Clip {
  return {
    name: track.clip,
    index: track.source.clipIndex,
    tracks: [track],
    start: track.times[0] ?? 0,
    end: track.times.at(-1) ?? 0,
    loop: false,
    marks: [],
  };
}
