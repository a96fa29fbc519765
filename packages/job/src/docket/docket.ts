import { PLAYBACKS, type PlaybackId } from '@slewcurve/core';
import { sayStep, type Step } from '@slewcurve/mend';
import { RULES, type HouseRules } from '@slewcurve/survey';
import type { TrackComparison } from '../compare.js';
import { sayConventions } from '../conventions.js';
import { LEVELS, type FileReport, type ReportedFinding, type StepReport } from '../report.js';
import { sayDone } from '../reporters/say-done.js';
import { sayFault, sayWhen } from '../reporters/say-finding.js';
import { counted } from '../reporters/say-verdict.js';
import { VERSION } from '../version.js';
import { statusOf } from './finding-status.js';

/** A piece of the docket: what it says, not how it looks. */
export type DocketBlock =
  | { readonly kind: 'heading' | 'paragraph' | 'caution' | 'code'; readonly text: string }
  | {
      readonly kind: 'list';
      /** Numbered: the order matters. */
      readonly ordered?: true;
      readonly items: readonly { readonly text: string; readonly struck?: true }[];
    }
  | {
      readonly kind: 'table';
      readonly head: readonly string[];
      readonly rows: readonly (readonly string[])[];
      /** Columns whose cells are short and stay on one line, from 0. */
      readonly short?: readonly number[];
      /** Drawings that stand beside rows, by row: SVG text. */
      readonly pictures?: readonly (string | undefined)[];
    };

/** Size and hash of a file's bytes. */
export interface FileBytes {
  readonly size: number;
  readonly sha256?: string;
}

/** What a docket is made of. */
export interface DocketParts {
  readonly before: FileBytes & { readonly report: FileReport };
  /** What the job card makes of it; left out where nothing was edited. */
  readonly after?: Partial<FileBytes> & Pick<FileReport, 'findings' | 'tracks'>;
  readonly playbacks: readonly PlaybackId[];
  readonly houseRules: HouseRules;
  /** How far tracks are apart under the first playback and another one, the worst first; left out where there is one playback. */
  readonly disagreements?: readonly (TrackComparison & { readonly playback: PlaybackId })[];
  /** Lines of the job card; skipped ones are struck out. */
  readonly lines: readonly { readonly step: Step; readonly skipped?: boolean }[];
  readonly proofs: readonly StepReport[];
  /** The command that does the same. */
  readonly command: string;
  /** A drawing of the half second on either side of a finding, SVG text; left out: none. */
  readonly picture?: (finding: ReportedFinding) => string | undefined;
}

/** The record that is handed on: one file, what was found, what was done, what it did, and what nobody looked at. */
export function docketOf(parts: DocketParts): readonly DocketBlock[] {
  return [
    { kind: 'heading', text: parts.before.report.file },
    ...fileBlocks(parts),
    { kind: 'heading', text: 'Findings' },
    ...findingBlocks(parts),
    ...playbackBlocks(parts),
    { kind: 'heading', text: 'Job card' },
    ...cardBlocks(parts),
    { kind: 'heading', text: 'Not checked' },
    { kind: 'list', items: notChecked(parts).map((text) => ({ text })) },
    { kind: 'heading', text: 'The same by command' },
    { kind: 'code', text: parts.command },
    ...cautionBlocks(parts.before.report),
  ];
}

function fileBlocks({ before, after, playbacks, houseRules }: DocketParts): DocketBlock[] {
  const { report } = before;
  const keys = report.tracks.reduce((sum, track) => sum + track.keys, 0);
  const roles = Object.entries(houseRules.roles).map(([pattern, role]) => `${pattern} is ${role}`);
  const lines = [
    `As it came: ${sayBytes(before)}; ${counted(report.tracks.length, 'rotation track')} in ${counted(report.clips.length, 'clip')}, ${keys.toLocaleString('en-GB')} keys.`,
    ...(after?.size === undefined ? [] : [`Mended: ${sayBytes({ ...after, size: after.size })}.`]),
    ...(report.conventions ? [`Conventions: ${sayConventions(report.conventions)}.`] : []),
    `Slewcurve ${VERSION} looked with ${counted(RULES.length, 'rule')}, as played: ${playbacks.map((id) => `${id.replaceAll('-', ' ')} (${PLAYBACKS[id].says})`).join('; ')}. Every motion was measured exactly; degrees, seconds of the file's own clock.`,
    `Roles: ${[...roles, 'a node with a camera is a camera on a screen, a joint of a skin a joint, anything else a prop'].join('; ')}.`,
  ];
  return lines.map((text) => ({ kind: 'paragraph' as const, text }));
}

function findingBlocks(parts: DocketParts): DocketBlock[] {
  const listed = statusOf(parts.before.report.findings, parts.after?.findings, parts.proofs);
  const open = listed.filter(({ isOpen }) => isOpen);
  const counts = LEVELS.map((level) =>
    counted(open.filter(({ finding }) => finding.level === level).length, level),
  );
  const summary = `Open: ${counts.join(', ')}. Mended or stamped: ${listed.length - open.length}.`;
  if (listed.length === 0) return [{ kind: 'paragraph', text: 'None.' }];
  const ranked = listed.toSorted(
    (a, b) =>
      Number(b.isOpen) - Number(a.isOpen) ||
      LEVELS.indexOf(a.finding.level) - LEVELS.indexOf(b.finding.level),
  );
  const pictures = ranked.map(({ finding }) => parts.picture?.(finding));
  return [
    { kind: 'paragraph', text: summary },
    {
      kind: 'table',
      head: ['level', 'track', 'at', 'what', 'value', 'limit', 'headroom', 'rule, as played', 'status'],
      rows: ranked.map(({ finding, status }) => [
        finding.level,
        `${finding.track} in ${finding.clip}`,
        sayWhen(finding),
        sayFault(finding),
        `${finding.value} ${finding.unit}`,
        `${finding.limit} ${finding.unit}`,
        headroom(finding),
        `${finding.rule}, ${finding.playback.replaceAll('-', ' ')}`,
        status,
      ]),
      short: [0, 2, 6],
      ...(parts.picture && { pictures }),
    },
  ];
}

/** Distance to the limit in per cent of it; negative beyond it. Where the limit is none to stay under, there is none to tell. */
function headroom({ value, limit }: ReportedFinding): string {
  return limit > 0 && value > limit ? `${Math.round(100 * (1 - value / limit))} %` : '';
}

function playbackBlocks({ disagreements, playbacks }: DocketParts): DocketBlock[] {
  if (disagreements === undefined) return [];
  const first = playbacks[0]?.replaceAll('-', ' ') ?? '';
  const rows = disagreements.map(({ clip, track, playback, angle, angleAt, rate }) => [
    `${track} in ${clip}`,
    playback.replaceAll('-', ' '),
    `${angle}°`,
    `${angleAt.toFixed(3)} s`,
    `${rate} deg/s`,
  ]);
  return [
    { kind: 'heading', text: 'Where playbacks disagree' },
    rows.length === 0
      ? { kind: 'paragraph', text: 'Nowhere: they play every track alike.' }
      : {
          kind: 'table',
          head: ['track', `${first} against`, 'at most apart', 'at', 'speed off by, over a key interval'],
          rows,
        },
  ];
}

function cardBlocks({ before, after, lines, proofs }: DocketParts): DocketBlock[] {
  if (lines.length === 0) return [{ kind: 'paragraph', text: 'Nothing was edited.' }];
  const done = new Map(proofs.map((proof) => [JSON.stringify(proof.step), proof]));
  const items = lines.map(({ step, skipped }) => {
    const proof = done.get(JSON.stringify(step));
    if (skipped) return { text: `${sayStep(step)} Skipped.`, struck: true as const };
    return { text: proof ? sayDone(proof) : sayStep(step) };
  });
  if (proofs.length === 0) return [{ kind: 'list', ordered: true, items }];
  const outside = Math.max(0, ...proofs.map((proof) => proof.outside));
  const kept = proofs.reduce((sum, { step }) => sum + (step.keep?.length ?? 0), 0);
  return [
    { kind: 'list', ordered: true, items },
    {
      kind: 'paragraph',
      text: `Proof: outside the spans of these steps the motion changes by at most ${outside}°; ${kept === 0 ? 'no keys were to be kept' : `${counted(kept, 'kept key')} stayed`}; tracks that no step names keep every number.`,
    },
    ...changeTable(before.report.tracks, after?.tracks ?? []),
  ];
}

/** Peak speed, peak acceleration and keys of the tracks whose figures changed. */
function changeTable(before: FileReport['tracks'], after: FileReport['tracks']): DocketBlock[] {
  const rows = before.flatMap((old) => {
    const now = after.find(({ clip, track }) => clip === old.clip && track === old.track);
    if (!now || JSON.stringify(now) === JSON.stringify(old)) return [];
    const change = (of: (track: typeof old) => number): string[] => [String(of(old)), String(of(now))];
    return [
      [
        `${old.track} in ${old.clip}`,
        ...change(({ peakRate }) => peakRate),
        ...change(({ peakAcceleration }) => peakAcceleration),
        ...change(({ keys }) => keys),
      ],
    ];
  });
  if (rows.length === 0) return [];
  const head = ['peak deg/s', 'peak deg/s²', 'keys'].flatMap((what) => [`${what} before`, 'after']);
  return [{ kind: 'table', head: ['track', ...head], rows }];
}

function notChecked({ before, houseRules }: DocketParts): string[] {
  const off = Object.entries(houseRules.levels).flatMap(([rule, level]) => (level === 'off' ? [rule] : []));
  return [
    'Translations, scales, weights and meshes.',
    ...(off.length > 0 ? [`Rules that the house rules turn off: ${off.join(', ')}.`] : []),
    ...(houseRules.exceptions.length > 0
      ? [`${counted(houseRules.exceptions.length, 'exception')} of the house rules.`]
      : []),
    ...(before.report.problems ?? []).map(({ code, message }) => `${message} ${code}`),
  ];
}

function cautionBlocks({ cautions = [] }: FileReport): DocketBlock[] {
  return [...cautions.map(({ message }) => message), SAFETY].map((text) => ({ kind: 'caution', text }));
}

const SAFETY =
  "With motorised heads and cranes, check limits and stops against the maker's data and local rules, by a licensed or responsible operator, at reduced speed first. Comfort numbers for headsets are guidance, not a standard. No figure here calls a motion safe.";

function sayBytes({ size, sha256 }: FileBytes): string {
  return `${size.toLocaleString('en-GB')} bytes${sha256 === undefined ? '' : `, SHA-256 ${sha256}`}`;
}
