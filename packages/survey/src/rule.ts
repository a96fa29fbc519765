import type { Clip, Curve, Playback, Regime, RotationTrack, SceneNode } from '@slewcurve/core';
import type { Step } from '@slewcurve/mend';
import type { Level, Way } from './finding.js';
import type { Role } from './roles.js';

/** Families of rules: the part of an id before the full stop. */
export type Family =
  'file' | 'turn' | 'jump' | 'pace' | 'shake' | 'seam' | 'limit' | 'horizon' | 'space' | 'keys';

/** Named thresholds of one rule for one role, in the units that the rule's page states. */
export type Limits = Readonly<Record<string, number>>;

/** A rule's thresholds for one role, or that the role is spared. */
export type RoleLimits = Limits | 'off';

/** A track as one chosen playback plays it. */
export interface PlayedTrack {
  readonly playback: Playback;
  readonly curve: Curve;
  /** Whether orientations are held from key to key, so that nothing turns between them. */
  readonly holds: boolean;
}

/** What people say this track means to do: spans and times in seconds. */
export interface DeclaredHere {
  readonly holds: readonly (readonly [number, number])[];
  readonly whips: readonly (readonly [number, number])[];
  /** Turns a minute. */
  readonly spins: readonly number[];
  /** Of the clip's own marks too. */
  readonly marks: readonly number[];
  /** The same node's tracks in clips that this one runs on into. */
  readonly joins: readonly RotationTrack[];
  /** The same node's tracks in later clips that this one is mixed with. */
  readonly blends: readonly RotationTrack[];
}

/** One track and what its rules need to know of it. */
export interface TrackContext {
  /** The track as the file has it, faulty keys included; declared cuts are breaks. */
  readonly stored: RotationTrack;
  /** The same without the keys that can't be played; the same object where all can. */
  readonly track: RotationTrack;
  readonly role: Role;
  /** Of `track`. */
  readonly regime: Regime;
  readonly loop: boolean;
  readonly declared: DeclaredHere;
  /** The playbacks chosen, those left out that can't play this track. */
  readonly played: readonly PlayedTrack[];
  readonly clip: Clip;
  /** The file's node tree at rest; empty where it is not known. */
  readonly nodes: readonly SceneNode[];
  /** Horizontal view angle of the camera on the track's node, radians; absent where there is none. */
  readonly view?: number;
  /** A rule's thresholds for this track, house rules applied; undefined where it is off. */
  limits(rule: string): Limits | undefined;
}

/** One place where a rule finds a track at fault, in the key numbers of the track that the rule reads. */
export interface Place {
  readonly keys: readonly number[];
  readonly time: number;
  readonly span: readonly [number, number];
  readonly value: number;
  readonly limit: number;
  readonly level: Level;
  /** The playback that it is worst under; the first chosen where all are alike. */
  readonly playback?: string;
  readonly confidence?: number;
  readonly ways?: readonly Way[];
  /** Another clip or node that the place is about, by name. */
  readonly other?: string;
  /** Further numbers that the rule's sentence needs. */
  readonly facts?: Readonly<Record<string, number>>;
}

/** What would mend a place. */
export interface Remedy {
  readonly step: Step;
  /** Largest turn of a key that it moves, degrees, where it was tried out. */
  readonly price?: number;
  readonly alternatives?: readonly Step[];
}

/** A rule's page, in Markdown pieces. */
export interface RulePage {
  /** What it is and where it comes from. */
  readonly what: string;
  /** How it looks in the trace of angular speed. */
  readonly trace: string;
  /** What the standard says, what programs do, what people see. */
  readonly standard: string;
  readonly programs: string;
  readonly people: string;
  /** The test in words and numbers. */
  readonly test: string;
  /** Where the default thresholds come from. */
  readonly source: string;
  /** What it leaves alone on purpose. */
  readonly spares: string;
  readonly remedy: string;
}

/** A kind of fault: one file under `rules/`, one line in the registry, one page. */
export interface Rule {
  /** `family.slug`; permanent. */
  readonly id: string;
  readonly family: Family;
  /** The level that most of its findings have. */
  readonly level: Level;
  readonly unit: 'deg' | 'deg/s' | 'deg/s²' | 'deg/s³' | 's' | 'Hz' | '%' | 'times' | 'numbers' | 'length';
  /** What the trade calls it elsewhere; feeds `explain`. */
  readonly alsoCalled: readonly string[];
  /** What it finds, one sentence. */
  readonly summary: string;
  readonly limits: Readonly<Record<Role, RoleLimits>>;
  /** Declarations that excuse a place at their time; left out: none. */
  readonly excusedBy?: readonly ('whips' | 'marks')[];
  /** Which track of the context its key numbers are of. */
  readonly reads: 'stored' | 'track';
  /** What its remedy leaves alone. */
  readonly untouched: string;
  readonly page: RulePage;
  /** Every place, in the order of keys. */
  find(context: TrackContext, limits: Limits): readonly Place[];
  /** What would mend a place that `find` gave; undefined where no verb that is built does. Asked of the worst places only. */
  remedy(context: TrackContext, place: Place, limits: Limits): Remedy | undefined;
  /** One place in a sentence: lower case, no full stop, value and limit said. */
  message(place: Place, remedy?: Remedy): string;
}

/** The same thresholds for every role. */
export function everyRole(limits: RoleLimits): Readonly<Record<Role, RoleLimits>> {
  return Object.freeze({
    joint: limits,
    prop: limits,
    'camera-screen': limits,
    'camera-headset': limits,
    eye: limits,
    machine: limits,
  });
}
