import type { Motion } from '../chart/motion.js';
import { crossTicks, horizonRing, seenFrom, tipOf, type Seen, type Vector, type View } from './view.js';

/** Inks of the globe, as CSS colours. */
export interface GlobeInks {
  readonly paper: string;
  readonly ink: string;
  readonly soft: string;
  readonly hairline: string;
  readonly trace: string;
  readonly second: string;
}

/** What the globe shows. Seconds, deg/s. */
export interface GlobeScene {
  readonly motion: Motion;
  readonly second?: Motion;
  readonly time: number;
  /** Stretch whose paths are drawn. */
  readonly span: readonly [number, number];
  readonly frame: number;
  /** Speed whose rod reaches the globe's edge, deg/s. */
  readonly fullRod: number;
  readonly noiseFloor: number;
  readonly horizon: boolean;
  readonly view: View;
}

/** The two own axes whose tips are followed: told apart by line and by label. */
const AXES: readonly { readonly axis: Vector; readonly says: string; readonly dash: readonly number[] }[] = [
  { axis: [0, 1, 0], says: 'own y', dash: [] },
  { axis: [0, 0, 1], says: 'own z', dash: [7, 3] },
];
/** Cross-ticks every tenth of a second: their spacing is the speed. */
const TICK = 0.1;
/** Points of a path: enough that a whole turn looks round. */
const POINTS = 240;
const GHOSTS = [-3, -2, -1, 1, 2, 3];

/** Draws the scene into a square of `size` CSS pixels. Plain lines: needs no GPU. */
export function drawGlobe(
  context: CanvasRenderingContext2D,
  size: number,
  scene: GlobeScene,
  inks: GlobeInks,
): void {
  const pen = new Pen(context, size, scene.view, inks.paper);
  context.clearRect(0, 0, size, size);
  drawRims(pen, scene, inks);
  for (const { axis, dash } of AXES) {
    if (scene.second)
      drawPath(pen, scene.second, scene, axis, { color: inks.second, dash: [2, 3], width: 1.2 }, false);
    drawPath(pen, scene.motion, scene, axis, { color: inks.trace, dash, width: 1.5 }, true);
  }
  for (const step of GHOSTS)
    drawAxes(pen, scene, scene.time + step * scene.frame, inks, 0.42 - Math.abs(step) * 0.09);
  drawRod(pen, scene, inks);
  drawAxes(pen, scene, scene.time, inks, 1);
}

interface Stroke {
  readonly color: string;
  readonly dash: readonly number[];
  readonly width: number;
}

/** Draws lines given in parent axes; what lies behind the globe's middle is faint. */
class Pen {
  readonly context: CanvasRenderingContext2D;
  readonly middle: number;
  readonly radius: number;
  readonly view: View;
  readonly paper: string;

  constructor(context: CanvasRenderingContext2D, size: number, view: View, paper: string) {
    this.paper = paper;
    this.context = context;
    this.middle = size / 2;
    this.radius = size / 2 - 22;
    this.view = view;
  }

  see(v: Vector): Seen {
    return seenFrom(this.view, v);
  }

  at(seen: Seen): [number, number] {
    return [this.middle + seen.right * this.radius, this.middle - seen.up * this.radius];
  }

  line(points: readonly Vector[], stroke: Stroke, alpha = 1): void {
    const seen = points.map((point) => this.see(point));
    for (const behind of [true, false]) {
      this.context.beginPath();
      for (let i = 1; i < seen.length; i++) {
        if (seen[i - 1].near + seen[i].near < 0 !== behind) continue;
        this.context.moveTo(...this.at(seen[i - 1]));
        this.context.lineTo(...this.at(seen[i]));
      }
      this.context.globalAlpha = alpha * (behind ? 0.28 : 1);
      this.stroke(stroke);
    }
    this.context.globalAlpha = 1;
  }

  stroke({ color, dash, width }: Stroke): void {
    this.context.strokeStyle = color;
    this.context.lineWidth = width;
    this.context.lineCap = 'round';
    this.context.setLineDash([...dash]);
    this.context.stroke();
    this.context.setLineDash([]);
  }

  words(text: string, seen: Seen, color: string): void {
    const [x, y] = this.at({ right: seen.right * 1.1, up: seen.up * 1.1, near: seen.near });
    this.context.fillStyle = color;
    this.context.globalAlpha = seen.near < 0 ? 0.55 : 1;
    this.context.textAlign = seen.right > 0.25 ? 'left' : seen.right < -0.25 ? 'right' : 'center';
    this.context.textBaseline = seen.up > 0.25 ? 'bottom' : seen.up < -0.25 ? 'top' : 'middle';
    const half = this.context.measureText(text).width;
    const left = this.context.textAlign === 'left' ? 0 : this.context.textAlign === 'right' ? half : half / 2;
    const held = Math.min(this.middle * 2 - half - 2, Math.max(2, x - left)) + left;
    // A rim of paper keeps the word legible over paths.
    this.context.strokeStyle = this.paper;
    this.context.lineWidth = 4;
    this.context.lineJoin = 'round';
    this.context.strokeText(text, held, y);
    this.context.fillText(text, held, y);
    this.context.globalAlpha = 1;
  }
}

function drawRims(pen: Pen, scene: GlobeScene, inks: GlobeInks): void {
  const { context } = pen;
  context.beginPath();
  context.arc(pen.middle, pen.middle, pen.radius, 0, 2 * Math.PI);
  pen.stroke({ color: inks.soft, dash: [], width: 1 });
  // Parent axes' own great circles, as hairlines; the level one is the horizon and is ruled for cameras.
  const level = horizonRing();
  pen.line(
    level.map(([x, , z]) => [x, z, 0]),
    { color: inks.hairline, dash: [], width: 1 },
  );
  pen.line(
    level.map(([x, , z]) => [0, x, z]),
    { color: inks.hairline, dash: [], width: 1 },
  );
  const ring: Stroke = scene.horizon
    ? { color: inks.ink, dash: [], width: 1 }
    : { color: inks.hairline, dash: [], width: 1 };
  pen.line(level, ring);
  if (scene.horizon) {
    pen.line(
      level.map(([x, , z]) => [x * 1.03, 0, z * 1.03]),
      ring,
    );
    pen.words('horizon', pen.see([-1, 0, 0.2]), inks.soft);
  }
}

function drawPath(
  pen: Pen,
  motion: Motion,
  scene: GlobeScene,
  axis: Vector,
  stroke: Stroke,
  ticked: boolean,
): void {
  const from = Math.max(scene.span[0], motion.start);
  const to = Math.min(scene.span[1], motion.end);
  if (to <= from) return;
  const points = Array.from({ length: POINTS + 1 }, (_, i) =>
    tipOf(motion.orientation(from + ((to - from) * i) / POINTS), axis),
  );
  pen.line(points, stroke);
  if (!ticked) return;
  for (const time of crossTicks(from, to, TICK)) drawTick(pen, motion, axis, time, stroke);
}

/** A short line across the path: at a right angle to the tip's own movement, on the globe. */
function drawTick(pen: Pen, motion: Motion, axis: Vector, time: number, stroke: Stroke): void {
  const step = 1e-3;
  const here = tipOf(motion.orientation(time), axis);
  const next = tipOf(motion.orientation(Math.min(motion.end, time + step)), axis);
  const past = tipOf(motion.orientation(Math.max(motion.start, time - step)), axis);
  const along: Vector = [next[0] - past[0], next[1] - past[1], next[2] - past[2]];
  const size = Math.hypot(...along);
  if (size < 1e-9) return;
  const across: Vector = [
    (here[1] * along[2] - here[2] * along[1]) / size,
    (here[2] * along[0] - here[0] * along[2]) / size,
    (here[0] * along[1] - here[1] * along[0]) / size,
  ];
  const half = 0.035;
  const end = (sign: number): Vector => [
    here[0] + sign * half * across[0],
    here[1] + sign * half * across[1],
    here[2] + sign * half * across[2],
  ];
  pen.line([end(-1), end(1)], { ...stroke, dash: [], width: 1 });
}

function drawAxes(pen: Pen, scene: GlobeScene, time: number, inks: GlobeInks, alpha: number): void {
  if (time < scene.motion.start || time > scene.motion.end) return;
  const orientation = scene.motion.orientation(time);
  const current = alpha === 1;
  for (const { axis, says, dash } of AXES) {
    const tip = tipOf(orientation, axis);
    pen.line([[0, 0, 0], tip], { color: inks.ink, dash, width: current ? 2 : 1 }, alpha);
    if (!current) continue;
    const [x, y] = pen.at(pen.see(tip));
    pen.context.beginPath();
    pen.context.arc(x, y, 3, 0, 2 * Math.PI);
    pen.context.fillStyle = inks.ink;
    pen.context.fill();
    pen.words(says, pen.see(tip), inks.ink);
  }
}

/** The turn axis: a double-ruled rod through the middle, as long as the speed. */
function drawRod(pen: Pen, scene: GlobeScene, inks: GlobeInks): void {
  const { own, speed } = scene.motion.read(scene.time);
  if (speed <= scene.noiseFloor || scene.fullRod <= 0) return;
  const length = Math.min(1, speed / scene.fullRod);
  const [x, y, z] = tipOf(scene.motion.orientation(scene.time), [
    own[0] / speed,
    own[1] / speed,
    own[2] / speed,
  ]);
  const end: Vector = [x * length, y * length, z * length];
  pen.line([[-end[0], -end[1], -end[2]], end], { color: inks.second, dash: [], width: 5 });
  pen.line([[-end[0], -end[1], -end[2]], end], { color: inks.paper, dash: [], width: 2 });
}
