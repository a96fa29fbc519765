import { nothing, svg, type SVGTemplateResult } from 'lit';
import type { Motion } from '../chart/motion.js';
import { sayAngle, sayNumber, sayTime } from '../chart/quantity.js';
import { tracePath, withinMotion } from '../chart/trace-path.js';
import { signed, type Hand, type Place } from './hand.js';
import type { LentStretch, PaceSketch } from './pace-sketch.js';
import { xOf, yOf, type Paper } from './paper-place.js';

/** The hatching for angle that is borrowed or pressed flat; once in a shadow tree. */
export const hatching: SVGTemplateResult = svg`<svg class="hatching" width="0" height="0" aria-hidden="true">
  <pattern id="hatch" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
    <path class="hatch" d="M0 0V5" />
  </pattern>
</svg>`;

/** What a hand does to the trace, drawn over a piece of paper. */
export interface HandScene {
  readonly paper: Paper;
  readonly hand: Hand;
  readonly sketch: PaceSketch | undefined;
  /** The motion before the edit. */
  readonly motion: Motion;
  /** The paper shows the new trace already. */
  readonly drawn: boolean;
  /** The paper has the cursor. */
  readonly here: boolean;
}

/** Pixels a column of what is drawn over the trace. */
const COLUMN = 1;
/** About what a letter of the price takes, px. */
const LETTER = 6.5;
/** A label keeps this far from both ends of the paper, px. */
const LABEL_ROOM = 78;

/** The new trace, what is borrowed for it or pressed flat, and its price. */
export function handPicture(scene: HandScene): SVGTemplateResult {
  const { paper, hand, sketch, drawn } = scene;
  return svg`<svg class="paper over" width=${paper.width} height=${paper.bands.bottom} aria-hidden="true">
    ${sketch ? sketch.lent.map((stretch) => lentMark(scene, sketch, stretch)) : nothing}
    ${hand.kind === 'limit' ? limitMark(scene) : nothing}
    ${hand.drawn ? handLine(paper, hand.drawn) : nothing}
    ${sketch && !drawn ? newTrace(scene, sketch.motion) : nothing}
    ${hand.kind === 'hold' && sketch ? holdMark(scene, sketch) : nothing}
    ${sketch ? lentWords(scene, sketch) : nothing}
    ${priceTag(scene)}
  </svg>`;
}

/** What an edit costs while the hand moves: "14.2° borrowed, no time added". */
export function priceWords(sketch: PaceSketch | undefined): string {
  if (!sketch) return '';
  const lent = sketch.lent.reduce((sum, { angle }) => sum + angle, 0);
  const words = [
    ...(lent > 0 ? [`${sayAngle(lent)} borrowed`] : []),
    ...(sketch.degrees === 0 ? [] : [signed(sketch.degrees, (size) => sayAngle(size))]),
    sketch.seconds === 0 ? 'no time added' : signed(sketch.seconds, saySeconds),
  ];
  return words.join(', ');
}

/** "14.2° from 1.00–1.40 s". */
function sayLent({ from, to, angle }: LentStretch): string {
  return `${sayAngle(angle)} from ${sayTime(from, 2).replace(' s', '')}–${sayTime(to, 2)}`;
}

function saySeconds(seconds: number): string {
  return `${sayNumber(seconds, seconds < 0.1 ? 2 : 3)} s`;
}

function columnsOf(paper: Paper, motion: Motion, from: number, to: number): Float32Array {
  const count = Math.max(2, Math.ceil((xOf(paper, to) - xOf(paper, from)) / COLUMN));
  return motion.columns(from, to, count).greatest;
}

/** Where the old trace stands above another line, hatched. `floor`: heights of that line in pixels, or one for all. */
function hatched(scene: HandScene, from: number, to: number, floor: Motion | number): SVGTemplateResult {
  const { paper, motion } = scene;
  const old = columnsOf(paper, motion, from, to);
  const low = typeof floor === 'number' ? undefined : columnsOf(paper, floor, from, to);
  const left = xOf(paper, from);
  const step = (xOf(paper, to) - left) / old.length;
  const top: string[] = [];
  const foot: string[] = [];
  for (let i = 0; i < old.length; i++) {
    const x = left + (i + 0.5) * step;
    const below = yOf(paper, low ? low[i] : typeof floor === 'number' ? floor : 0);
    top.push(`${x.toFixed(1)} ${Math.min(below, yOf(paper, old[i])).toFixed(1)}`);
    foot.push(`${x.toFixed(1)} ${below.toFixed(1)}`);
  }
  return svg`<path class="lent" d=${`M${top.join('L')}L${foot.toReversed().join('L')}Z`} />`;
}

function lentMark(
  scene: HandScene,
  sketch: PaceSketch,
  { from, to }: LentStretch,
): SVGTemplateResult | typeof nothing {
  const { row } = scene.paper;
  const [a, b] = [Math.max(from, row.from), Math.min(to, row.to)];
  return b > a ? hatched(scene, a, b, sketch.motion) : nothing;
}

function lentWords(scene: HandScene, sketch: PaceSketch): SVGTemplateResult {
  const { paper } = scene;
  let free = -Infinity;
  return svg`${sketch.lent.map((stretch) => {
    const middle = (stretch.from + stretch.to) / 2;
    const x = Math.max(LABEL_ROOM, Math.min(paper.width - LABEL_ROOM, xOf(paper, middle)));
    if (middle < paper.row.from || middle >= paper.row.to || x - free < 2 * LABEL_ROOM) return nothing;
    free = x;
    return svg`<text class="lent-words" x=${x} y=${clearOf(scene, sketch, x)}>${sayLent(stretch)}</text>`;
  })}`;
}

/** A height at which a label about `x` covers neither trace. */
function clearOf({ paper, motion }: HandScene, sketch: PaceSketch, x: number): number {
  const { row, width, bands } = paper;
  const at = (px: number): number => row.from + (px / width) * (row.to - row.from);
  const most = [motion, sketch.motion].map(
    (each) => each.columns(at(x - LABEL_ROOM), at(x + LABEL_ROOM), 1).greatest[0],
  );
  return Math.max(bands.top + 10, yOf(paper, Math.max(...most)) - 7);
}

/** The ruled line, and what it presses flat. */
function limitMark(scene: HandScene): SVGTemplateResult {
  const { paper, hand, sketch, motion } = scene;
  const [from, to] = sketch?.span ?? [motion.start, motion.end];
  const [a, b] = [Math.max(from, paper.row.from), Math.min(to, paper.row.to)];
  if (b <= a) return svg``;
  const y = Math.round(yOf(paper, hand.amount)) + 0.5;
  return svg`${sketch ? hatched(scene, a, b, hand.amount) : nothing}
    <line class="limit" x1=${xOf(paper, a)} x2=${xOf(paper, b)} y1=${y} y2=${y} />`;
}

function newTrace({ paper }: HandScene, motion: Motion): SVGTemplateResult {
  const { row, width, bands, scale } = paper;
  const columns = withinMotion(motion.columns(row.from, row.to, Math.ceil(width / COLUMN)), row, motion);
  const place = { left: 0, width: COLUMN, base: bands.base, height: bands.base - bands.top };
  return svg`<path class="line trace" d=${tracePath(columns, scale, place)} />`;
}

/** The line as the hand drew it. */
function handLine(paper: Paper, drawn: readonly Place[]): SVGTemplateResult {
  const points = drawn
    .map(({ time, speed }) => `${xOf(paper, time).toFixed(1)} ${yOf(paper, speed).toFixed(1)}`)
    .join('L');
  return svg`<path class="hand-line" d=${`M${points}`} />`;
}

/** A hold is a thick rule on the baseline. */
function holdMark({ paper, hand }: HandScene, sketch: PaceSketch): SVGTemplateResult | typeof nothing {
  const begins = sketch.newTime(hand.time);
  const [a, b] = [xOf(paper, begins), xOf(paper, begins + (hand.later ?? 0))];
  const [left, right] = [Math.max(0, a), Math.min(paper.width, b)];
  if (right <= left) return nothing;
  return svg`<rect class="hold" x=${left} width=${right - left} y=${paper.bands.base - 1.5} height="4" />`;
}

/** What it does and costs: beside the handle, or riding on a limit's own line. */
function priceTag({ paper, hand, sketch, here }: HandScene): SVGTemplateResult | typeof nothing {
  const words = [hand.tag, priceWords(sketch)].filter((part) => part !== '').join(' · ');
  if (hand.kind === 'limit')
    return here
      ? svg`<text class="price limit" text-anchor="end" x=${paper.width - 40} y=${yOf(paper, hand.amount) - 6}>${words}</text>`
      : nothing;
  const time = (sketch ? sketch.newTime(hand.time) : hand.time) + (hand.later ?? 0);
  if (time < paper.row.from || time >= paper.row.to) return nothing;
  const x = xOf(paper, time);
  const room = words.length * LETTER + 14;
  const anchor = x + room > paper.width && x > room ? 'end' : 'start';
  const beside = anchor === 'end' ? -14 : 14;
  return svg`<text class="price ${hand.kind}" text-anchor=${anchor} x=${x + beside} y=${paper.bands.top - 6}>${words}</text>`;
}
