import { html, nothing, type TemplateResult } from 'lit';
import type { ReactiveControllerHost } from 'lit';
import { frameLength, type ChartData } from '../chart/chart-data.js';
import type { Motion } from '../chart/motion.js';
import { drawingAt } from './drawing.js';
import type { Ground, Hand, HandEdit, Place } from './hand.js';
import { HandAtWork } from './hand-at-work.js';
import { handOfEdit } from './hand-of-edit.js';
import { handPicture, priceWords } from './hand-picture.js';
import { holdAt } from './hold.js';
import { keySpeed } from './key-speed.js';
import { keyTime } from './key-time.js';
import { limitAt } from './limit.js';
import { pixelOf, placeAt, xOf, yOf, type Paper } from './paper-place.js';
import { pressAt } from './press.js';

/** The chart, as its hands see it. */
export interface ChartHost extends ReactiveControllerHost {
  readonly data: ChartData | undefined;
  readonly time: number;
  readonly span: readonly [number, number] | undefined;
  /** Puts the keyboard on the handle at work. */
  focusGrip(): void;
  send(type: string, detail: unknown): void;
}

/** A press reaches this share of a row, where nobody said how far. */
const REACH = 1 / 14;
/** The trace is caught from this far, px. */
const CATCH = 9;
/** Pixels of time around a place within which the trace's highest and lowest count. */
const BESIDE = 5;

/** A hand rests where it did not move for so long, ms. */
const RESTED_MS = 500;

/** What can be begun by hand at the cursor. */
export type HandName = 'press' | 'limit' | 'hold' | 'draw';

/** The edits by hand on a chart, its rows and its close-up alike: where they begin, how they are drawn, what their handles do. */
export class ChartHands {
  readonly work: HandAtWork;
  /** The law that a press keeps to. */
  ends: Ground['ends'] = 'same';
  private paper: Paper | undefined;
  private said = '';
  private next = '';
  private saying: ReturnType<typeof setTimeout> | undefined;
  private readonly host: ChartHost;

  constructor(host: ChartHost) {
    this.host = host;
    this.work = new HandAtWork({
      addController: (controller) => host.addController(controller),
      removeController: (controller) => host.removeController(controller),
      requestUpdate: () => host.requestUpdate(),
      get updateComplete() {
        return host.updateComplete;
      },
      send: (type, detail) => host.send(type, detail),
      ground: () => this.ground(),
    });
  }

  /** What the hand does and costs, for those who don't see it: said when it has rested for a moment. */
  get spoken(): string {
    const { hand, sketch, problem } = this.work;
    const now = hand ? [hand.says, problem || priceWords(sketch)].filter(Boolean).join(', ') : '';
    if (now !== this.next) {
      this.next = now;
      clearTimeout(this.saying);
      this.saying = setTimeout(() => {
        this.said = this.next;
        this.host.requestUpdate();
      }, RESTED_MS);
    }
    return this.said;
  }

  get hand(): Hand | undefined {
    return this.work.hand;
  }

  /** The motion that edits act on: before the one at hand. */
  get motion(): Motion | undefined {
    const { data } = this.host;
    return data?.tried ? data.before?.motion : data?.motion;
  }

  /** The motion as it would be, for what tells numbers while a hand moves. */
  get shown(): Motion | undefined {
    return this.work.sketch && !this.host.data?.tried ? this.work.sketch.motion : this.host.data?.motion;
  }

  /** The paper that new hands begin on. */
  on(paper: Paper): this {
    this.paper = paper;
    return this;
  }

  ground(): Ground | undefined {
    const { data, span } = this.host;
    const { motion, paper } = this;
    if (!data || !motion || !paper) return undefined;
    const keys = data.tried ? (data.before?.keys ?? data.keys) : data.keys;
    const frame = frameLength(data);
    const fold = paper.row.to - paper.row.from;
    const reach = Math.max(2 * frame, Math.round(fold * REACH * 1000) / 1000);
    return { motion, keys, frame, span, ends: this.ends, reach, pixel: pixelOf(paper) };
  }

  /** Whether a drag from a point takes hold: an upright one where the trace is, as near as a hand can tell; any while a speed is drawn. */
  catches(paper: Paper, x: number, y: number): 'upright' | 'any' | undefined {
    const { motion, hand } = this;
    if (hand?.gathers) return 'any';
    if (!motion) return undefined;
    const from = placeAt(paper, x - BESIDE, 0).time;
    const { greatest, least } = motion.columns(from, placeAt(paper, x + BESIDE, 0).time, 1);
    return y > yOf(paper, greatest[0]) - CATCH && y < yOf(paper, least[0]) + CATCH ? 'upright' : undefined;
  }

  /** A pointer takes hold of a handle, or of the trace where it stands: of the hand at work, or of a new one. */
  grab(paper: Paper, grip: string | undefined, place: Place): void {
    const { hand } = this;
    const ground = this.on(paper).ground();
    if (!ground) return;
    const ofKey = grip === undefined ? null : /^(knob|post)-(\d+)$/.exec(grip);
    const begun = ofKey
      ? keyHand(ground, ofKey[1] === 'knob' ? 'knob' : 'post', Number(ofKey[2]))
      : hand && (grip !== undefined || hand.gathers)
        ? hand
        : fresh(
            ground,
            grip === 'limit' ? 'limit' : 'press',
            grip === undefined ? place.time : this.host.time,
            paper,
          );
    if (begun) this.work.grab(begun, place);
  }

  /** The pointer is lifted, or, `lost`, was taken away. */
  rest(lost: boolean): void {
    if (lost) this.work.letGo();
    else this.work.rest();
    this.host.focusGrip();
  }

  /** Whether a new trace is drawn over the old one. */
  get sketched(): boolean {
    return this.work.sketch !== undefined && !this.host.data?.tried;
  }

  /** Begins at the cursor, from a button: the keyboard is on its handle then. */
  begin(paper: Paper, name: HandName): void {
    const ground = this.on(paper).ground();
    if (!ground) return;
    this.work.settle(fresh(ground, name, this.host.time, paper));
    this.host.focusGrip();
  }

  /** A press keeps to another law from now on; the one at work too. */
  chooseEnds(ends: Ground['ends']): void {
    this.ends = ends;
    const { hand } = this;
    const ground = this.ground();
    if (!hand || !ground || hand.kind !== 'press') return this.host.requestUpdate();
    const changed = handOfEdit({ ...hand.edit, ends }, ground);
    if (changed) this.work.settle(changed);
  }

  /** The step at hand was written otherwise, or is gone. */
  follow(edit: HandEdit | undefined): void {
    if (!edit) return this.work.follow(undefined);
    const ground = this.ground();
    if (!ground || edit === this.hand?.edit) return;
    if (edit.verb === 'shape' && edit.ends) this.ends = edit.ends;
    this.work.follow(handOfEdit(edit, ground));
  }

  /** What lies over a piece of paper. */
  picture(paper: Paper, here: boolean): unknown {
    const { hand, motion } = this;
    const { sketch } = this.work;
    if (!hand || !motion || paper.width === 0 || !(here || touches(paper, hand, this))) return nothing;
    return handPicture({ paper, hand, sketch, motion, drawn: this.host.data?.tried === true, here });
  }

  /** The handles on a piece of paper; `here`: it has the cursor. */
  grips(paper: Paper, here: boolean): TemplateResult | typeof nothing {
    const { hand } = this;
    const ground = this.ground() ?? this.on(paper).ground();
    // One key alone has no pace.
    if (!ground || paper.width === 0 || ground.keys.length < 2) return nothing;
    if (hand) return hand.kind === 'limit' ? this.limitGrip(paper, hand, here) : this.grip(paper, hand);
    if (!here) return nothing;
    this.on(paper);
    return html`${this.grip(paper, pressAt(this.ground() ?? ground, this.host.time))}
    ${this.limitGrip(paper, limitAt(ground, this.host.time, paper.scale.high), true)}`;
  }

  /** In the close-up: the handle at work, or those of one key, its knob for the speed and its post for the time. */
  keyGrips(paper: Paper, key: number): TemplateResult | typeof nothing {
    if (this.hand) return this.grips(paper, true);
    const ground = this.on(paper).ground();
    if (!ground || paper.width === 0 || key < 0 || ground.keys.length < 2) return nothing;
    const post = keyTime(ground, key);
    return html`${this.grip(paper, keySpeed(ground, key))} ${post ? this.grip(paper, post) : nothing}`;
  }

  private grip(paper: Paper, hand: Hand): TemplateResult | typeof nothing {
    const { sketch } = this.work;
    const time = (sketch?.newTime(hand.time) ?? hand.time) + (hand.later ?? 0);
    if (time < paper.row.from || time >= paper.row.to) return nothing;
    const speed = (this.shown ?? this.motion)?.read(time).speed ?? 0;
    const y =
      typeof hand.stands === 'object'
        ? yOf(paper, hand.stands.speed)
        : hand.stands === 'trace'
          ? yOf(paper, speed)
          : hand.kind === 'retime'
            ? (paper.bands.posts + paper.bands.feet) / 2
            : paper.bands.base;
    return this.slider(hand, `left:${xOf(paper, time)}px;top:${y}px`, hand.kind);
  }

  private limitGrip(paper: Paper, hand: Hand, here: boolean): TemplateResult | typeof nothing {
    if (!here) return nothing;
    return this.slider(hand, `left:${paper.width - 14}px;top:${yOf(paper, hand.amount)}px`, 'limit');
  }

  private slider(hand: Hand, style: string, kind: string): TemplateResult {
    const keyed = (event: KeyboardEvent): void => {
      if (!this.hand) {
        const begun = hand.nudged(event);
        if (!begun) return;
        event.preventDefault();
        event.stopPropagation();
        this.work.settle(begun);
      } else if (!this.work.keyed(event)) return;
      this.host.focusGrip();
    };
    return html`<div
      class="grip ${kind} ${this.hand ? 'at-work' : ''}"
      data-grip=${kind}
      role="slider"
      tabindex="0"
      aria-label=${hand.label}
      aria-valuenow=${hand.amount}
      aria-valuetext=${[hand.says, priceWords(this.work.sketch)].filter(Boolean).join(', ')}
      .style=${style}
      @keydown=${keyed}
    ></div>`;
  }
}

function fresh(ground: Ground, name: HandName, time: number, paper: Paper): Hand {
  if (name === 'limit') return limitAt(ground, time, paper.scale.high);
  if (name === 'draw') return drawingAt(ground, time, paper.row.to - paper.row.from);
  return name === 'hold' ? holdAt(ground, time) : pressAt(ground, time);
}

function keyHand(ground: Ground, which: 'knob' | 'post', key: number): Hand | undefined {
  return which === 'knob' ? keySpeed(ground, key) : keyTime(ground, key);
}

/** Whether a hand shows on a piece of paper: within what it changes, and after that where time runs. */
function touches({ row }: Paper, hand: Hand, { work }: ChartHands): boolean {
  const { sketch } = work;
  const [from, to] = sketch ? sketch.played : [hand.time, hand.time];
  return (
    row.to > from &&
    (row.from <= to || (sketch !== undefined && (sketch.seconds !== 0 || sketch.degrees !== 0)))
  );
}
