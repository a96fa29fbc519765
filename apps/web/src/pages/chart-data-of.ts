import { playAs, type PlaybackId, type RotationTrack } from '@slewcurve/core';
import {
  curveMotion,
  rateNames,
  remedyWays,
  type ChartData,
  type MarginNote,
  type Motion,
} from '@slewcurve/elements/plot';
import { inTurn } from '@slewcurve/elements/theme/in-turn';
import type { ReportedFinding, ReportedOccurrence } from '@slewcurve/job';
import { eventAt, roleOf } from '@slewcurve/survey';
import { trackKey, type FileWork } from '../session/file-work.js';
import type { Clock } from './clock-choice.js';
import type { ChosenTrack } from './roster-rows.js';

/** Notes a chart shows at most; the rest is told by count. */
const MOST_NOTES = 60;
/** Milliseconds of measuring between two pictures. */
const PREPARING_MS = 10;

/** What is drawn of a track. */
export interface ChartSubject {
  readonly chosen: ChosenTrack;
  readonly file: FileWork;
  /** As the file has it, as the job card leaves it, and as the sentence at hand would leave it. */
  readonly before: RotationTrack;
  readonly after: RotationTrack;
  readonly preview?: RotationTrack;
  readonly playback: PlaybackId;
  readonly second?: PlaybackId;
  readonly kept?: readonly number[];
  readonly clock: Clock;
  /** The speed that the house rules allow, deg/s. */
  readonly limit?: number | undefined;
  /** The clip is declared to play as a loop. */
  readonly looped: boolean;
}

// By track, then by playback: compiling a curve and measuring its segments costs.
const motions = new WeakMap<RotationTrack, Map<PlaybackId, Motion>>();

/** The motion of a track as a playback plays it; made once. */
function motionOf(track: RotationTrack, playback: PlaybackId): Motion {
  const known = motions.get(track) ?? new Map<PlaybackId, Motion>();
  motions.set(track, known);
  const motion = known.get(playback) ?? curveMotion(playAs(track, playback));
  known.set(playback, motion);
  return motion;
}

/** Measures what drawing a track will ask for, between pictures; goes on while it is `wanted`. */
export async function measureAhead(
  track: RotationTrack,
  playback: PlaybackId,
  wanted: () => boolean,
): Promise<void> {
  const motion = await inTurn(() => motionOf(track, playback));
  while (wanted() && !(await inTurn(() => motion.prepare(PREPARING_MS))));
}

/** Whether two subjects make the same chart: a file changes at every step of a survey, its one track hardly ever. */
export function drawsTheSame(a: ChartSubject, b: ChartSubject): boolean {
  const key = trackKey(a.chosen.clip, a.chosen.track);
  const rest = [
    'chosen',
    'before',
    'after',
    'preview',
    'playback',
    'second',
    'kept',
    'clock',
    'limit',
    'looped',
  ] as const;
  return (
    rest.every((name) => a[name] === b[name]) &&
    a.file.report === b.file.report &&
    a.file.events === b.file.events &&
    a.file.findings.get(key) === b.file.findings.get(key)
  );
}

/** The chart's data: after solid, before dotted where they differ. */
export function chartDataOf(subject: ChartSubject): ChartData {
  const { chosen, file, playback, kept, limit } = subject;
  const shown = subject.preview ?? subject.after;
  const clip = file.report?.clips.find((other) => other.clip === chosen.clip);
  const report = file.report?.tracks.find(
    (other) => trackKey(other.clip, other.track) === trackKey(chosen.clip, chosen.track),
  );
  return {
    track: chosen.track,
    clip: chosen.clip,
    file: file.name,
    motion: motionOf(shown, playback),
    playback: playback.replaceAll('-', ' '),
    keys: shown.times,
    cuts: shown.breaks,
    noiseFloor: report?.noiseFloor ?? 0,
    rateNames: rateNames(roleOf(shown, file.opened?.nodes ?? [])),
    notes: notesOf(subject, clip?.frameRate),
    ...(clip && subject.looped && { loop: clip.seconds }),
    ...clockOf(subject.clock, clip?.frameRate),
    ...(kept && { kept }),
    ...(limit !== undefined && { limit: { speed: limit, name: 'house rule' } }),
    ...comparedWith(subject, shown),
  };
}

function clockOf({ form, frameRate }: Clock, found: number | undefined): Partial<ChartData> {
  const rate = frameRate ?? found;
  return { timeForm: form, ...(rate !== undefined && { frameRate: rate }) };
}

/** The motions that stand beside the one shown. */
function comparedWith(
  { before, after, preview, playback, second }: ChartSubject,
  shown: RotationTrack,
): Partial<ChartData> {
  const earlier = preview ? after : before;
  return {
    ...(earlier !== shown && {
      before: { motion: motionOf(earlier, playback), name: 'before', keys: earlier.times },
    }),
    ...(preview && preview !== after && { tried: true }),
    ...(second && { second: { motion: motionOf(shown, second), name: second.replaceAll('-', ' ') } }),
  };
}

/** By what the acceptance of a note is taken back: the finding where the note stands for all its places, else its place. */
export function acceptedAs({
  finding,
  place,
}: {
  readonly finding: ReportedFinding;
  readonly place: ReportedOccurrence;
}): string {
  return hasOneRemedy(finding) || finding.muted === 'stamped' ? finding.fingerprint : place.fingerprint;
}

/** A place of a finding by the id of its note. */
export function placeOfNote(
  findings: readonly ReportedFinding[],
  id: string,
): { readonly finding: ReportedFinding; readonly place: ReportedOccurrence } | undefined {
  for (const finding of findings) {
    const place = finding.occurrences.find((other) => noteId(finding, other) === id);
    if (place) return { finding, place };
  }
  return undefined;
}

function notesOf({ chosen, file }: ChartSubject, frameRate: number | undefined): MarginNote[] {
  return (file.findings.get(trackKey(chosen.clip, chosen.track)) ?? [])
    .flatMap((finding) =>
      hasOneRemedy(finding)
        ? [noteOf(finding, finding.occurrences[0])]
        : finding.occurrences.map((place) => noteOf(finding, place)),
    )
    .slice(0, MOST_NOTES)
    .map((note) => {
      const event = eventAt(file.events, { ...chosen, rule: note.rule }, note.time, frameRate);
      return event && event.tracks > 2 ? { ...note, event } : note;
    });
}

/** All places are mended by one and the same step: one note stands for them. */
function hasOneRemedy({ occurrences }: ReportedFinding): boolean {
  const [first] = occurrences;
  return occurrences.every(({ remedy }) => JSON.stringify(remedy) === JSON.stringify(first?.remedy));
}

function noteOf(finding: ReportedFinding, place: ReportedOccurrence | undefined): MarginNote {
  const one = !hasOneRemedy(finding) && place !== undefined;
  const places = one ? [place] : finding.occurrences;
  const open = places.filter(({ stamp }) => stamp === undefined);
  const { time, level, remedy, alternatives = [] } = open[0] ?? place ?? finding;
  const [proposed, ...others] = remedy ? remedyWays([remedy, ...alternatives]) : [];
  return {
    id: place ? noteId(finding, place) : finding.fingerprint,
    rule: finding.rule,
    level,
    message: asSentence(place && one ? place.message : finding.message),
    time,
    places: open.length > 0 ? open : places,
    count: one ? 1 : finding.count,
    status: isAccepted(finding, one, open) ? 'stamped' : 'open',
    ...effectAt(finding, time),
    ...acceptedOf(places),
    ...(proposed && { remedy: proposed }),
    ...(others.length > 0 && { others }),
  };
}

/** Whether nothing of a note is open: the whole finding is accepted, or the one place that it stands for. */
function isAccepted({ muted }: ReportedFinding, one: boolean, open: readonly ReportedOccurrence[]): boolean {
  return muted === 'stamped' || (one && open.length === 0);
}

/** What is seen is told of a finding's worst place alone. */
function effectAt(finding: ReportedFinding, time: number): Pick<MarginNote, 'effect'> {
  const { effect } = finding;
  return effect && time === finding.time ? { effect } : {};
}

/** Which of a note's places are accepted, and why. */
function acceptedOf(places: readonly ReportedOccurrence[]): Pick<MarginNote, 'accepted'> {
  const stamps = places.flatMap(({ stamp }) => stamp ?? []);
  if (stamps.length === 0) return {};
  const reasons = stamps.map(({ reason, by, date }) => `${reason} (${by}, ${date})`);
  return { accepted: { places: stamps.length, reasons: [...new Set(reasons)] } };
}

function noteId(finding: ReportedFinding, place: ReportedOccurrence): string {
  return `${finding.fingerprint}/${place.fingerprint}`;
}

function asSentence(message: string): string {
  return `${message.charAt(0).toUpperCase()}${message.slice(1)}${message.endsWith('.') ? '' : '.'}`;
}

/** A clip shorter than a row of ten seconds takes the whole row. */
export function wholeClip({ motion }: ChartData): number | undefined {
  const seconds = motion.end - motion.start;
  return seconds > 0 && seconds < 10 ? seconds : undefined;
}
