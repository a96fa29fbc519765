import {
  LitElement,
  html,
  nothing,
  type CSSResult,
  type PropertyDeclarations,
  type PropertyValues,
  type TemplateResult,
} from 'lit';
import { frameLength, trackName, usualSpeed, type ChartData } from './chart/chart-data.js';
import { frameBy } from './chart/chart-keys.js';
import { readTimesAs, sayNumber, sayRate, sayTime } from './chart/quantity.js';
import { NO_TURN, nudgedTurn, turnOfDrag, type Turn } from './gesture/key-turn.js';
import { describeMoment } from './porthole/describe.js';
import { drawGlobe } from './porthole/globe.js';
import { PLAY_SPEEDS, playOn } from './porthole/play-clock.js';
import { portholeStyles } from './porthole/porthole-styles.js';
import { FIRST_VIEW, turnView, type View } from './porthole/view.js';
import { controls } from './theme/controls.js';
import { inTurn } from './theme/in-turn.js';
import { inkOf } from './theme/ink-of.js';
import { holdPointer } from './theme/hold-pointer.js';
import { paper } from './theme/paper.js';
import { valueOf } from './theme/value-of.js';

/** Paths reach this far to both sides of the moment, seconds. */
const REACH = 1.5;
/** Degrees that an arrow key turns the view. */
const KEY_TURN = 10;

/**
 * 3-D view: a globe on which the tips of the thing's own y and z axes leave their paths, with a cross-tick every 0.1 s, so that
 * the spacing of the ticks is the speed. Drawn with plain lines; needs no GPU.
 *
 * @fires time-changed - `{ time: number, playing: boolean }` seconds
 * @fires key-turned - `{ turn: Turn, settled: boolean }` while `turning`
 * @fires edit-taken - Enter while `turning`
 * @fires edit-dropped - Escape while `turning`
 * @fires playing-changed - `{ playing: boolean }`
 */
export class SlewPorthole extends LitElement {
  static override properties: PropertyDeclarations = {
    data: { attribute: false },
    time: { type: Number },
    span: { attribute: false },
    speed: { type: Number },
    playing: { type: Boolean, reflect: true },
    camera: { type: Boolean },
    view: { attribute: false },
    turning: { type: Boolean },
    turn: { attribute: false },
    size: { state: true },
  };
  static override styles: CSSResult[] = [paper, controls, portholeStyles];

  declare data: ChartData | undefined;
  /** The moment shown, seconds. */
  declare time: number;
  /** Stretch that is played and drawn; left out: all is played, a second and a half to both sides drawn. */
  declare span: readonly [number, number] | undefined;
  /** Of playing, against the clock on the wall: 0.05 to 4. */
  declare speed: number;
  declare playing: boolean;
  /** A camera: the horizon is ruled. */
  declare camera: boolean;
  declare view: View;
  /** A drag, or the arrow keys, turn the thing instead of looking round. */
  declare turning: boolean;
  /** The turn at hand, degrees about x, y and z of whichever axes the page says. */
  declare turn: Turn;
  declare private size: number;
  private frame = 0;
  private past = 0;
  private fullRod = 1;
  private drag: { x: number; y: number; view: View; turn: Turn } | undefined;
  private readonly resize = new ResizeObserver(() => this.measure());

  constructor() {
    super();
    this.time = 0;
    this.speed = 1;
    this.playing = false;
    this.camera = false;
    this.view = FIRST_VIEW;
    this.turning = false;
    this.turn = NO_TURN;
    this.size = 0;
  }

  override connectedCallback(): void {
    super.connectedCallback();
    this.resize.observe(this);
    matchMedia('(prefers-color-scheme: dark)').addEventListener('change', this.redraw);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.resize.disconnect();
    matchMedia('(prefers-color-scheme: dark)').removeEventListener('change', this.redraw);
    cancelAnimationFrame(this.frame);
    this.frame = 0;
  }

  /** Draws the globe again, after the page changed its inks or scheme. */
  readonly redraw = (): void => this.requestUpdate();

  /** Plays, or stops. */
  toggle(): void {
    if (!this.data) return;
    this.playing = !this.playing;
    this.send('playing-changed', { playing: this.playing });
  }

  private get played(): readonly [number, number] {
    return this.span ?? [this.data?.motion.start ?? 0, this.data?.motion.end ?? 0];
  }

  protected override willUpdate(changed: PropertyValues<this>): void {
    if (this.data) readTimesAs(this.data.timeForm, this.data.frameRate);
    if (changed.has('data') && this.data)
      this.fullRod = Math.max(1.5 * usualSpeed(this.data.motion), this.data.noiseFloor, 1e-9);
    if (changed.has('playing')) this.wind();
  }

  private wind(): void {
    if (!this.playing) {
      cancelAnimationFrame(this.frame);
      this.frame = 0;
      return;
    }
    if (this.time >= this.played[1] - 1e-9) this.time = this.played[0];
    this.past = performance.now();
    if (this.frame === 0) this.frame = requestAnimationFrame(this.tick);
  }

  private readonly tick = (now: number): void => {
    this.frame = 0;
    if (!this.playing || !this.data) return;
    // A page that was in the background must not leap: at most a tenth of a second a picture.
    const elapsed = Math.min(0.1, Math.max(0, (now - this.past) / 1000));
    this.past = now;
    // Going round for ever is motion that nobody asked for twice: not where less motion is wished.
    const still = matchMedia('(prefers-reduced-motion: reduce)').matches;
    const loops = this.data.loop !== undefined && !still;
    const next = playOn(this.time, elapsed, this.speed, this.played, loops);
    this.setTime(next.time);
    if (next.ended) this.toggle();
    else this.frame = requestAnimationFrame(this.tick);
  };

  private setTime(time: number): void {
    const { motion } = this.data ?? {};
    if (!motion) return;
    this.time = Math.min(motion.end, Math.max(motion.start, time));
    this.send('time-changed', { time: this.time, playing: this.playing });
  }

  protected override render(): TemplateResult {
    const { data } = this;
    if (!data || data.keys.length === 0) return html`<p class="empty">3-D view: no motion to show.</p>`;
    return html`<figure>
        <div
          class="globe"
          role="application"
          tabindex="0"
          aria-label=${`3-D view of ${trackName(data.track)}: arrow keys ${this.turning ? 'turn the key' : 'look round'}`}
          aria-describedby="words"
          @pointerdown=${this.grab}
          @pointermove=${this.pull}
          @pointerup=${this.letGo}
          @pointercancel=${this.letGo}
          @keydown=${this.keyed}
        >
          <canvas aria-hidden="true"></canvas>
        </div>
        <figcaption>
          <b>3-D view at ${sayTime(this.time, 2)}</b>
          <span id="words">${describeMoment(data.motion, this.time, data.noiseFloor)}</span>
          A tick across the path every 0.1 s; the rod is the turn axis, at full length from
          ${sayRate(this.fullRod)}.
          ${this.turning ? 'Drag or arrow keys turn the key; with Shift a drag turns about z.' : 'Drag or arrow keys look round.'}
        </figcaption>
      </figure>
      ${this.controls(data)}<span class="swatch"></span>`;
  }

  private controls(data: ChartData): TemplateResult {
    const [from, to] = this.played;
    return html`<div class="play on-screen" role="group" aria-label="Playing">
      <input
        type="range"
        aria-label="Time"
        aria-valuetext=${sayTime(this.time, 2)}
        min=${from}
        max=${to}
        step=${frameLength(data)}
        .value=${String(this.time)}
        @input=${(event: Event) => this.setTime(Number(valueOf(event)))}
      />
      <button class="main" @click=${() => this.toggle()}>${this.playing ? 'Stop' : 'Play'}</button>
      <button @click=${() => this.step(-1)}>A frame back</button>
      <button @click=${() => this.step(1)}>A frame on</button>
      <label>
        at
        <select aria-label="Speed of playing" @change=${this.chooseSpeed}>
          ${PLAY_SPEEDS.map(
            (speed) =>
              html`<option value=${speed} ?selected=${speed === this.speed}>
                ${sayNumber(speed)} × speed
              </option>`,
          )}
        </select>
      </label>
      ${
        this.view === FIRST_VIEW
          ? nothing
          : html`<button class="plain" @click=${() => (this.view = FIRST_VIEW)}>
              Look from the first place
            </button>`
      }
    </div>`;
  }

  private step(frames: number): void {
    if (!this.data) return;
    if (this.playing) this.toggle();
    this.setTime(frameBy(this.time, frames, this.data));
  }

  private readonly chooseSpeed = (event: Event): void => {
    this.speed = Number(valueOf(event));
  };

  private readonly grab = (event: PointerEvent): void => {
    if (event.button !== 0) return;
    holdPointer(event);
    this.drag = { x: event.clientX, y: event.clientY, view: this.view, turn: this.turn };
  };

  private readonly pull = (event: PointerEvent): void => {
    const { drag } = this;
    if (!drag || this.size === 0) return;
    if (this.turning) {
      const [x, y, z] = turnOfDrag(event.clientX - drag.x, event.clientY - drag.y, this.size, event.shiftKey);
      return this.sendTurn([drag.turn[0] + x, drag.turn[1] + y, drag.turn[2] + z], false);
    }
    // Across the globe is half a turn, as if the hand held its surface.
    const perPixel = 180 / this.size;
    this.view = turnView(drag.view, (drag.x - event.clientX) * perPixel, (event.clientY - drag.y) * perPixel);
  };

  private readonly letGo = (): void => {
    const { drag } = this;
    this.drag = undefined;
    if (drag && this.turning && this.turn !== drag.turn) this.sendTurn(this.turn, true);
  };

  private sendTurn(turn: Turn, settled: boolean): void {
    this.turn = turn;
    this.send('key-turned', { turn, settled });
  }

  private send(type: string, detail?: unknown): void {
    this.dispatchEvent(new CustomEvent(type, { detail, bubbles: true, composed: true }));
  }

  /** While the thing is turned: arrows by 0.1°, Enter takes it, Escape lets go. */
  private turnKeyed(event: KeyboardEvent): boolean {
    if (!this.turning) return false;
    const turn = nudgedTurn(this.turn, event);
    if (turn) this.sendTurn(turn, true);
    else if (event.key === 'Enter') this.send('edit-taken');
    else if (event.key === 'Escape') {
      this.drag = undefined;
      this.turn = NO_TURN;
      this.send('edit-dropped');
    } else return false;
    event.preventDefault();
    event.stopPropagation();
    return true;
  }

  private readonly keyed = (event: KeyboardEvent): void => {
    if (event.ctrlKey || event.metaKey || event.altKey || this.turnKeyed(event)) return;
    const turns: Readonly<Record<string, readonly [number, number]>> = {
      ArrowLeft: [-KEY_TURN, 0],
      ArrowRight: [KEY_TURN, 0],
      ArrowUp: [0, KEY_TURN],
      ArrowDown: [0, -KEY_TURN],
    };
    if (event.key in turns) this.view = turnView(this.view, ...turns[event.key]);
    else if (event.key === ' ') this.toggle();
    else if (event.key === 'Escape' && this.drag) {
      this.view = this.drag.view;
      this.drag = undefined;
    } else return;
    event.preventDefault();
  };

  protected override scheduleUpdate(): Promise<void> {
    return inTurn(() => this.performUpdate());
  }

  protected override updated(): void {
    // Measuring lays the page out; later sizes come from the observer, after the browser has done that by itself.
    if (this.size === 0) this.measure();
    this.draw();
  }

  private measure(): void {
    const globe = this.renderRoot.querySelector('.globe');
    if (globe && Math.abs(globe.clientWidth - this.size) >= 1) this.size = globe.clientWidth;
  }

  private draw(): void {
    const canvas = this.renderRoot.querySelector('canvas');
    const swatch = this.renderRoot.querySelector<HTMLElement>('.swatch');
    const context = canvas?.getContext('2d');
    if (!canvas || !context || !swatch || !this.data || this.size === 0) return;
    const ratio = devicePixelRatio;
    const pixels = Math.round(this.size * ratio);
    if (canvas.width !== pixels) canvas.width = canvas.height = pixels;
    context.setTransform(ratio, 0, 0, ratio, 0, 0);
    context.font = `12px ${getComputedStyle(this).fontFamily}`;
    const { data } = this;
    drawGlobe(
      context,
      this.size,
      {
        motion: data.motion,
        ...(data.second ? { second: data.second.motion } : data.before && { second: data.before.motion }),
        time: this.time,
        span: this.span ?? [this.time - REACH, this.time + REACH],
        frame: frameLength(data),
        fullRod: this.fullRod,
        noiseFloor: data.noiseFloor,
        horizon: this.camera,
        view: this.view,
      },
      {
        paper: inkOf(swatch, '--_paper'),
        ink: inkOf(swatch, '--_ink'),
        soft: inkOf(swatch, '--_soft'),
        hairline: inkOf(swatch, '--_hairline'),
        trace: inkOf(swatch, '--_trace'),
        second: inkOf(swatch, '--_second'),
      },
    );
  }
}
