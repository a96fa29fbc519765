import { html, nothing, svg, type TemplateResult } from 'lit';
import { caretPath, type Caret, type CaretSpan } from './carets.js';
import type { ChartData } from './chart-data.js';
import type { FoldRow } from './fold.js';
import { holdStretches } from './holds.js';
import { differenceColumns, type Motion, type SpeedColumns } from './motion.js';
import { keyLine, type Rail } from './posts.js';
import { sayAngle, sayNumber, sayRate, saySpan } from './quantity.js';
import { speedTicks, tickPlaces, timeTicks, type SpeedScale } from './scale.js';
import { overshoots, tracePath, withinMotion, type TracePlace } from './trace-path.js';

/** Heights of a row's bands, CSS pixels from its top. */
export const ROW = {
  top: 20,
  base: 120,
  posts: 124,
  feet: 135,
  times: 148,
  carets: 140,
  caret: 9,
  bottom: 164,
} as const;
/** The same for the close-up, which is tall and has room for the keys' numbers. */
export const TALL_ROW = {
  top: 22,
  base: 250,
  posts: 255,
  feet: 270,
  times: 299,
  carets: 290,
  caret: 10,
  bottom: 314,
} as const;
export type RowBands = { readonly [Band in keyof typeof ROW]: number };
const DIFFERENCE = 34;

/** What a row is drawn from. */
export interface RowScene {
  readonly data: ChartData;
  readonly row: FoldRow;
  readonly scale: SpeedScale;
  readonly width: number;
  readonly bands: RowBands;
  readonly carets: readonly Caret[];
  readonly spans: readonly CaretSpan[];
  /** The note that is chosen: its carets are ringed. */
  readonly chosen?: string | undefined;
  /** What the picture is called. */
  readonly says: string;
}

/** Height of a row's picture, CSS pixels. */
export function rowHeight(data: ChartData, bands: RowBands): number {
  return bands.bottom + (data.before || data.second ? DIFFERENCE : 0);
}

/** One row of the folded trace as a picture. */
export function rowPicture(scene: RowScene): TemplateResult {
  const { width, data, bands } = scene;
  const height = rowHeight(data, bands);
  const columns = Math.max(1, Math.floor(width));
  const now = columnsOf(scene, data.motion, columns);
  return html`<svg
    class="paper"
    role="img"
    aria-label=${scene.says}
    width=${width}
    height=${height}
    viewBox="0 0 ${width} ${height}"
  >
    ${ruling(scene)} ${noiseBand(scene)} ${limitLine(scene)} ${holds(scene, now)}
    ${data.before ? traceLine(scene, columnsOf(scene, data.before.motion, columns), 'before') : nothing}
    ${data.second ? traceLine(scene, columnsOf(scene, data.second.motion, columns), 'second') : nothing}
    ${traceLine(scene, now, 'trace')} ${offPaper(scene, now)} ${keyMarks(scene)} ${spanRules(scene)}
    ${caretMarks(scene)} ${differenceLane(scene)} ${foldMark(scene)}
  </svg>`;
}

function columnsOf({ row }: RowScene, motion: Motion, count: number): SpeedColumns {
  const known = columnsKnown.get(motion) ?? new Map<string, SpeedColumns>();
  columnsKnown.set(motion, known);
  if (known.size > MOST_KNOWN) known.clear();
  const name = `${row.from} ${row.to} ${count}`;
  const columns = known.get(name) ?? withinMotion(motion.columns(row.from, row.to, count), row, motion);
  known.set(name, columns);
  return columns;
}

// A motion stays as it is while an edit beside it is tried again and again.
const columnsKnown = new WeakMap<Motion, Map<string, SpeedColumns>>();
/** Rows of one motion that are kept. */
const MOST_KNOWN = 400;

function traceLine(scene: RowScene, columns: SpeedColumns, kind: string): TemplateResult {
  const place: TracePlace = {
    left: 0,
    width: scene.width / columns.greatest.length,
    base: scene.bands.base,
    height: scene.bands.base - scene.bands.top,
  };
  return svg`<path class="line ${kind}" d=${tracePath(columns, scene.scale, place)} />`;
}

/** What is faster than the paper is tall, written where it leaves. */
function offPaper(scene: RowScene, columns: SpeedColumns): TemplateResult {
  const { width, bands, scale } = scene;
  const place = { left: 0, width: width / columns.greatest.length, base: bands.base, height: 1 };
  return svg`${overshoots(columns, scale, place, 74).map(({ x, speed }) => {
    const right = x > width - 74;
    return svg`<path class="leaves" d="M${x - 4} ${bands.top + 1}l8 -3M${x - 4} ${bands.top - 2}l8 -3" />
      <text class="leaves" text-anchor=${right ? 'end' : 'start'} x=${right ? x - 7 : x + 7} y=${bands.top - 1}>${sayRate(speed, 4)}</text>`;
  })}`;
}

function spanRules(scene: RowScene): TemplateResult {
  const y = scene.bands.carets - 2.5;
  return svg`${scene.spans.map(
    ({ from, to, status }) => svg`<path class="span ${status}" d="M${from} ${y}H${to}" />`,
  )}`;
}

function heightOf(scene: RowScene, speed: number): number {
  const { base, top } = scene.bands;
  return base - scene.scale.share(speed) * (base - top);
}

/** Ruled lines with their speeds, the baseline with its seconds. */
function ruling(scene: RowScene): TemplateResult {
  const { row, width, bands, scale } = scene;
  const tall = bands.base - bands.top > 120;
  const speeds = speedTicks(scale, tall ? 5 : 2);
  const named = scale.kind === 'log' && !tall ? speeds.filter((_, i) => i % 3 === 2) : speeds;
  const times = timeTicks(row.from, row.to, width / 92).filter((t) => t > row.from);
  const places = tickPlaces(times[1] - times[0]);
  return svg`
    ${speeds.map((speed) => {
      const y = Math.round(heightOf(scene, speed)) + 0.5;
      return svg`<line class="ruled" x1="0" x2=${width} y1=${y} y2=${y} />`;
    })}
    <line class="baseline" x1="0" x2=${width} y1=${bands.base + 0.5} y2=${bands.base + 0.5} />
    ${named.map(
      (speed) =>
        svg`<text class="speed" x="3" y=${heightOf(scene, speed) - 3}>${sayNumber(speed)} deg/s</text>`,
    )}
    ${times.map((time) => {
      const x = ((time - row.from) / (row.to - row.from)) * width;
      const clash = scene.carets.some((caret) => Math.abs(caret.x + 8 - x) < 34);
      return svg`<line class="second-mark" x1=${x} x2=${x} y1=${bands.base} y2=${bands.base + 3} />
        ${clash || x > width - 14 ? nothing : svg`<text class="time" x=${x} y=${bands.times}>${time.toFixed(places)} s</text>`}`;
    })}`;
}

function noiseBand(scene: RowScene): TemplateResult {
  const y = heightOf(scene, scene.data.noiseFloor);
  return svg`<rect class="noise" x="0" width=${scene.width} y=${y} height=${Math.max(0, scene.bands.base - y)} />`;
}

function limitLine(scene: RowScene): TemplateResult | typeof nothing {
  const { limit } = scene.data;
  if (!limit || limit.speed > scene.scale.high) return nothing;
  const y = Math.round(heightOf(scene, limit.speed)) + 0.5;
  return svg`<line class="limit" x1="0" x2=${scene.width} y1=${y} y2=${y} />
    <text class="limit-name" x=${scene.width - 3} y=${y - 3}>${limit.name} ${sayRate(limit.speed)}</text>`;
}

/** Holds are a thick rule on the baseline. */
function holds(scene: RowScene, columns: SpeedColumns): TemplateResult {
  const step = scene.width / columns.greatest.length;
  const y = scene.bands.base - 1;
  return svg`${holdStretches(columns, scene.data.noiseFloor, 8).map(
    ({ from, to }) =>
      svg`<rect class="hold" x=${from * step} width=${(to - from) * step} y=${y} height="3" />`,
  )}`;
}

function keyMarks(scene: RowScene): TemplateResult {
  const { data, row, width, bands } = scene;
  const { posts, rails } = keyLine(data.keys, row.from, row.to, width, data.kept);
  const cuts = (data.cuts ?? [])
    .map((key) => ((data.keys[key + 1] - row.from) / (row.to - row.from)) * width)
    .filter((x) => x >= 0 && x <= width);
  return svg`
    ${rails.map((rail) => railMark(rail, bands))}
    ${posts.map(({ x, kept }) => svg`<path class="post" d=${postPath(x, bands, kept)} />`)}
    ${cuts.map((x) => svg`<path class="cut" d="M${x - 1.5} ${bands.top}V${bands.feet}M${x + 1.5} ${bands.top}V${bands.feet}" />`)}`;
}

/** A short upright with a flat cap; a kept key has two. */
function postPath(x: number, bands: RowBands, kept: boolean): string {
  const cap = `M${x - 2.5} ${bands.posts + 0.5}H${x + 2.5}`;
  return `${cap}${kept ? `M${x - 2.5} ${bands.posts + 3.5}H${x + 2.5}` : ''}M${x} ${bands.posts}V${bands.feet}`;
}

/** Keys too close to be told apart: a rail with what lies between two of them. */
function railMark({ from, to, gap }: Rail, bands: RowBands): TemplateResult {
  const y = bands.posts + 0.5;
  return svg`<path class="rail" d="M${from} ${y + 5}V${y}H${to}V${y + 5}" />
    ${to - from > 130 ? svg`<text class="rail-words" x=${(from + to) / 2} y=${y + 4}>a key every ${saySpan(gap)}</text>` : nothing}`;
}

function caretMarks(scene: RowScene): TemplateResult {
  const { bands, carets, chosen } = scene;
  return svg`${carets.map((caret) => {
    const ringed = caret.note === chosen;
    const path = caretPath(caret.level, caret.x, bands.carets, bands.caret);
    const after = caretWords(caret);
    return svg`<g class="caret ${caret.level} ${caret.status}" data-note=${caret.note}>
      <rect class="touch" x=${caret.x - 14} y=${bands.posts} width="28" height=${bands.bottom - bands.posts} />
      <path class="mark" d=${path} />
      ${caret.status === 'stamped' ? svg`<path class="struck" d="M${caret.x - 8} ${bands.carets + 6}H${caret.x + 18}" />` : nothing}
      ${ringed ? svg`<circle class="ring" cx=${caret.x} cy=${bands.carets + bands.caret * 0.55} r=${bands.caret + 1} />` : nothing}
      <text x=${caret.x + bands.caret * 0.55 + 4} y=${bands.carets + bands.caret + 1}>${after}</text>
    </g>`;
  })}`;
}

/** What stands beside a caret: its number, `!` for an error, and what else it stands for. */
function caretWords({ number, level, stands, others }: Caret): string {
  const more = others > 0 ? ` +${others}` : stands > 1 ? ` ×${stands}` : '';
  return `${number}${level === 'error' ? '!' : ''}${more}`;
}

/** How far the two motions stand apart, on a lane of its own under the row. */
function differenceLane(scene: RowScene): TemplateResult | typeof nothing {
  const { data, row, width, bands } = scene;
  const other = data.before ?? data.second;
  if (!other) return nothing;
  const count = Math.max(1, Math.floor(width / 2));
  const apart = differenceColumns(data.motion, other.motion, row.from, row.to, count);
  const most = apart.reduce((a, b) => Math.max(a, b), 0);
  const foot = bands.bottom + DIFFERENCE - 8;
  const words = `differs from ${other.name} by ${most > 1e-6 ? `up to ${sayAngle(most)}` : 'nothing'}`;
  const step = width / count;
  const points = [...apart].map(
    (value, i) => `${(i + 0.5) * step} ${foot - (most > 0 ? (value / most) * 14 : 0)}`,
  );
  return svg`<line class="ruled" x1="0" x2=${width} y1=${foot + 0.5} y2=${foot + 0.5} />
    ${most > 1e-6 ? svg`<path class="difference" d="M0 ${foot}L${points.join('L')}L${width} ${foot}Z" />` : nothing}
    <text class="speed" x="3" y=${foot - 17}>${words}</text>`;
}

/** Where a row ends at the end of a loop, the paper is folded. */
function foldMark(scene: RowScene): TemplateResult | typeof nothing {
  const { data, row, width, bands } = scene;
  if (data.loop === undefined || Math.abs(row.to - row.from - data.loop) > 1e-6) return nothing;
  return svg`<path class="fold" d="M${width - 9} ${bands.top - 12}L${width - 0.5} ${bands.top - 3.5}V${bands.base}" />`;
}
