import { numberNotes } from './carets.js';
import { peakSpeed, trackName, type ChartData } from './chart-data.js';
import { foldRows, type FoldRow } from './fold.js';
import type { Motion, Reading } from './motion.js';
import { acceptedWords, effectWords, eventWords } from './note-words.js';
import { firstKeyAfter, firstKeyAt } from './posts.js';
import { sayAngle, sayCount, sayList, sayRate, saySpan, sayTime } from './quantity.js';

/** The trace in prose, for those who don't see it: one string a paragraph. */
export function textTwin(data: ChartData): string[] {
  const { motion, keys } = data;
  const seconds = motion.end - motion.start;
  const peak = peakSpeed(motion);
  const paragraphs = [
    `${trackName(data.track)} in ${data.clip} lasts ${saySpan(seconds)} and has ${sayCount(keys.length, 'key')}. ` +
      `Played ${data.playback}, it turns ${sayAngle(motion.read(motion.end).odometer)} in all; ` +
      `its greatest speed is ${sayRate(peak.speed)} near ${sayTime(peak.time, 2)}. ` +
      `Below ${sayRate(data.noiseFloor)} nothing is claimed.`,
  ];
  if (data.limit) {
    const over = peak.speed > data.limit.speed;
    paragraphs.push(
      `The ${data.limit.name} is ${sayRate(data.limit.speed)}; the motion ${over ? 'passes' : 'stays below'} it.`,
    );
  }
  if (data.before) paragraphs.push(compared(data.before.motion, `Before the edits`, peak.speed));
  if (data.second) paragraphs.push(compared(data.second.motion, `Played ${data.second.name}`, peak.speed));
  if (data.loop !== undefined) paragraphs.push('It plays as a loop: its end meets its start.');
  paragraphs.push(findingsSentence(data), ...noteSentences(data));
  return paragraphs;
}

/** A row of the chart in one sentence: what its picture is called. */
export function rowSentence(data: ChartData, row: FoldRow): string {
  const line = tableLine(data, row);
  const numbers = numberNotes(data.notes)
    .filter(({ note }) => note.places.some((place) => place.time >= row.from && place.time < row.to))
    .map(({ number }) => String(number));
  const found = numbers.length === 0 ? 'no findings' : `finding ${sayList(numbers.slice(0, 12))}`;
  return (
    `${sayTime(row.from, 1)} to ${sayTime(Math.min(row.to, data.motion.end), 1)}: ` +
    `up to ${sayRate(line.peak)}, turns ${sayAngle(line.turned)}, odometer ${sayAngle(line.odometer)}, ` +
    `${sayCount(line.keys, 'key')}, ${found}.`
  );
}

/** One line of the table that says the same as a row. */
export interface TableLine {
  readonly from: number;
  readonly to: number;
  readonly peak: number;
  readonly turned: number;
  readonly odometer: number;
  readonly keys: number;
}

/** The chart as a table: a line a row. */
export function tableLines(data: ChartData, fold: number): TableLine[] {
  return foldRows(data.motion.start, data.motion.end, fold).map((row) => tableLine(data, row));
}

function tableLine(data: ChartData, row: FoldRow): TableLine {
  const to = Math.min(row.to, data.motion.end);
  const { greatest } = data.motion.columns(row.from, to, 64);
  const odometer = data.motion.read(to).odometer;
  return {
    from: row.from,
    to,
    peak: greatest.reduce((a, b) => Math.max(a, b), 0),
    turned: odometer - data.motion.read(row.from).odometer,
    odometer,
    // A key on a fold belongs to the row that begins there.
    keys:
      (to < data.motion.end ? firstKeyAt(data.keys, to) : firstKeyAfter(data.keys, to)) -
      firstKeyAt(data.keys, row.from),
  };
}

/** What the cursor reads, in words: the value of the chart's slider. */
export function sayReading(reading: Reading, names: readonly [string, string, string]): string {
  const own = names.map((name, i) => `${name} ${sayRate(reading.own[i])}`);
  return `${sayTime(reading.time)}, ${sayRate(reading.speed)}, ${own.join(', ')}, odometer ${sayAngle(reading.odometer, 4)}`;
}

function compared(other: Motion, opening: string, peak: number): string {
  const theirs = peakSpeed(other);
  return `${opening} the greatest speed is ${sayRate(theirs.speed)} near ${sayTime(theirs.time, 2)}, against ${sayRate(peak)}.`;
}

function findingsSentence(data: ChartData): string {
  const open = data.notes.filter((note) => note.status === 'open');
  if (open.length === 0) return 'Nothing is left to mend here.';
  const levels = (['error', 'warning', 'note'] as const)
    .map((level) => ({ level, count: open.filter((note) => note.level === level).length }))
    .filter(({ count }) => count > 0)
    .map(({ level, count }) => sayCount(count, level));
  return `There ${open.length === 1 ? 'is' : 'are'} ${sayList(levels)} in the margin.`;
}

/** What is seen of findings, what they share their instant with, and what is accepted. */
function noteSentences({ notes }: ChartData): string[] {
  return numberNotes(notes).flatMap(({ note, number }) => {
    const words = [effectWords(note), eventWords(note), acceptedWords(note)].filter(
      (said) => said !== undefined,
    );
    return words.length === 0 ? [] : [`Finding ${number}: ${words.join('. ')}.`];
  });
}
