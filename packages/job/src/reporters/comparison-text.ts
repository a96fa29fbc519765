import type { Comparison, ComparisonFinding, TrackComparison } from '../compare.js';
import { printable } from './printable.js';
import { counted } from './say-verdict.js';

/** Two files compared, as people read it: a line for each track that differs, the worst first, the verdict last. */
export function comparisonText(comparison: Comparison): string {
  const { a, b, tracks, findings, onlyInA, onlyInB, playback, looks, limits, verdict } = comparison;
  const differing = tracks
    .filter(({ angle, rate }) => angle > 0 || rate > 0)
    .toSorted((one, other) => other.angle - one.angle || other.rate - one.rate);
  const limit = [
    ...(limits.angle === undefined ? [] : [`${limits.angle}°`]),
    ...(limits.rate === undefined ? [] : [`${limits.rate} deg/s`]),
  ];
  return [
    ...differing.map(sayTrack),
    ...findings.map(sayFinding),
    ...onlyInA.map(({ clip, track }) => `${track} in ${clip}: only in ${a}`),
    ...onlyInB.map(({ clip, track }) => `${track} in ${clip}: only in ${b}`),
    `${a} and ${b}, played ${playback.replaceAll('-', ' ')}: ${differing.length} of ${counted(tracks.length, 'common track')} differ; angles looked at ${looks} times in each key interval`,
    `verdict: ${verdict}. ${limit.length > 0 ? `limit ${limit.join(' and ')}` : 'no limit given'}`,
  ]
    .map((line) => `${printable(line)}\n`)
    .join('');
}

function sayTrack({ clip, track, angle, angleAt, rate, rateOver: [from, to] }: TrackComparison): string {
  return `${track} in ${clip}: at most ${angle}° apart, at ${angleAt.toFixed(3)} s; speed off by at most ${rate} deg/s, over ${from.toFixed(3)} to ${to.toFixed(3)} s`;
}

function sayFinding({
  rule,
  clip,
  track,
  keys: [own, other],
  value,
  unit,
  limit,
}: ComparisonFinding): string {
  const say = (size: number): string => (unit === 'deg' ? `${size}°` : `${size} ${unit}`);
  const keys = own === other ? `${own} keys in both` : `${counted(own, 'key')} and ${other}`;
  return `error ${rule}: ${track} in ${clip} is ${say(value)} off (limit ${say(limit)}), ${keys}`;
}
