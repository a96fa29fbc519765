import { sayTime, type TimeForm } from '@slewcurve/core';
import type { FileReport } from '../report.js';
import type { MatrixCell } from '../playback-matrix.js';

interface Worst extends MatrixCell {
  readonly clip: string;
  readonly track: string;
}

/** A file's playbacks by tick rate: in each cell the worst speed and the worst departure of all its tracks, and below where the worst of all is. */
export function textMatrix(file: FileReport, time: TimeForm): string[] {
  const matrices = file.matrix ?? [];
  const all = matrices.flatMap(({ clip, track, cells }) =>
    cells.map((cell): Worst => ({ ...cell, clip, track })),
  );
  if (all.length === 0) return [];
  const playbacks = [...new Set(all.map(({ playback }) => playback))];
  const ticks = [...new Set(all.map((cell) => cell.ticks))];
  const heads = ['', ...ticks.map((rate) => (rate === undefined ? 'every moment' : `${rate} a second`))];
  const rows = playbacks.map((playback) => [
    playback,
    ...ticks.map((rate) => cellOf(all.filter((cell) => cell.playback === playback && cell.ticks === rate))),
  ]);
  const widths = heads.map((head, i) => Math.max(head.length, ...rows.map((row) => row[i]?.length ?? 0)));
  const line = (cells: readonly string[]): string =>
    cells
      .map((cell, i) => (i === 0 ? cell.padEnd(widths[i] ?? 0) : cell.padStart(widths[i] ?? 0)))
      .join('  ')
      .trimEnd();
  return [
    `${file.file}: worst speed in deg/s, and largest angle from the file as written, by playback and ticks`,
    line(heads),
    ...rows.map(line),
    ...[worstOf(all, 'worstRate'), worstOf(all, 'departure')].map((cell) => sayWorst(cell, file, time)),
    '',
  ];
}

function cellOf(cells: readonly Worst[]): string {
  if (cells.length === 0) return '-';
  return `${number(worstOf(cells, 'worstRate').worstRate)}, ${number(worstOf(cells, 'departure').departure)}°`;
}

type Measure = 'worstRate' | 'departure';

function worstOf<T extends MatrixCell>(cells: readonly T[], by: Measure): T & { by: Measure } {
  const worst = cells.reduce((most, cell) => (cell[by] > most[by] ? cell : most));
  return { ...worst, by };
}

function sayWorst(cell: Worst & { by: Measure }, file: FileReport, form: TimeForm): string {
  const fps = file.clips.find(({ clip }) => clip === cell.clip)?.frameRate;
  const isRate = cell.by === 'worstRate';
  const what = isRate ? `fastest: ${number(cell.worstRate)} deg/s` : `farthest: ${number(cell.departure)}°`;
  const ticks = cell.ticks === undefined ? 'at every moment' : `at ${cell.ticks} ticks a second`;
  return `${what}, ${cell.track} in ${cell.clip}, ${sayTime(isRate ? cell.worstRateAt : cell.departureAt, form, fps)}, as played by ${cell.playback} ${ticks}`;
}

function number(value: number): string {
  if (value !== 0 && Math.abs(value) < 0.005) return value.toExponential(1);
  return value.toLocaleString('en-GB', { maximumFractionDigits: Math.abs(value) >= 100 ? 0 : 2 });
}
