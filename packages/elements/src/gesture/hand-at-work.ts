import { SlewcurveError, type Curve } from '@slewcurve/core';
import type { ReactiveController, ReactiveControllerHost } from 'lit';
import type { Motion } from '../chart/motion.js';
import type { Ground, Hand, Place } from './hand.js';
import { sketchPace, type HandLaw, type PaceSketch } from './pace-sketch.js';
import { speedOutline } from './speed-outline.js';

/** What a hand needs of the element that it works on. */
export interface HandHost extends ReactiveControllerHost {
  /** What it would work on now; undefined without a track. */
  ground(): Ground | undefined;
  send(type: string, detail: unknown): void;
}

/**
 * The one edit that is being made by hand. Says `edit-sketched` whenever it changes, settled when the hand rests, `edit-taken` when it is to be done, and
 * `edit-dropped` when it is let go.
 */
export class HandAtWork implements ReactiveController {
  hand: Hand | undefined;
  /** What it would make of the speed; the last one that could be made. Undefined while it changes nothing. */
  sketch: PaceSketch | undefined;
  /** Why it can't be made as it stands; empty: it can. */
  problem = '';
  /** While a pointer holds it. */
  held = false;
  private grabbed: { readonly hand: Hand; readonly from: Place } | undefined;
  /** What `sketch` is of. */
  private drawn: { readonly motion: Motion; readonly law: HandLaw } | undefined;
  private outline: { readonly motion: Motion; readonly span: string; readonly curve: Curve } | undefined;
  private readonly host: HandHost;

  constructor(host: HandHost) {
    this.host = host;
    host.addController(this);
  }

  hostDisconnected(): void {
    this.release();
  }

  /** Takes a hand up, from a pointer at `from`. */
  grab(hand: Hand, from: Place): void {
    this.grabbed = { hand, from };
    this.held = true;
    // The keyboard may be anywhere while a pointer is down.
    addEventListener('keydown', this.escaped, { capture: true });
    this.work(hand, false);
  }

  drag(to: Place): void {
    if (!this.grabbed) return;
    const { hand, from } = this.grabbed;
    const next = hand.dragged(from, to);
    if (hand.gathers) this.grabbed = { hand: next, from: to };
    this.work(next, false);
  }

  /** The pointer is lifted: the edit rests as it is, or goes where it changes nothing. */
  rest(): void {
    this.release();
    if (this.hand?.law) this.settle(this.hand);
    else this.letGo();
  }

  /** Puts a hand at rest. */
  settle(hand: Hand): void {
    this.work(hand, true);
  }

  /** As `settle`, without a word to the page, which said it itself. */
  follow(hand: Hand | undefined): void {
    this.put(hand);
  }

  /** A key on the handle; whether it was one of the hand's. */
  readonly keyed = (event: KeyboardEvent): boolean => {
    const { hand } = this;
    if (!hand || event.defaultPrevented) return false;
    if (event.key === 'Escape') this.letGo();
    else if (event.key === 'Enter' && !this.held) this.take();
    else {
      const nudged = hand.nudged(event);
      if (!nudged) return false;
      this.settle(nudged);
    }
    event.preventDefault();
    event.stopPropagation();
    return true;
  };

  take(): void {
    if (this.hand && this.sketch && !this.problem) this.host.send('edit-taken', undefined);
  }

  letGo(): void {
    if (!this.hand) return;
    this.release();
    this.put(undefined);
    this.host.send('edit-dropped', undefined);
  }

  private release(): void {
    this.grabbed = undefined;
    this.held = false;
    removeEventListener('keydown', this.escaped, { capture: true });
  }

  private readonly escaped = (event: KeyboardEvent): void => {
    if (event.key !== 'Escape') return;
    event.preventDefault();
    event.stopPropagation();
    this.letGo();
  };

  private work(hand: Hand, settled: boolean): void {
    this.put(hand);
    const { sketch } = this;
    this.host.send('edit-sketched', { edit: hand.edit, settled, motion: sketch?.motion, idle: !hand.law });
  }

  private put(hand: Hand | undefined): void {
    this.hand = hand;
    this.problem = '';
    if (!hand?.law) this.sketch = undefined;
    else this.draw(hand.law);
    this.host.requestUpdate();
  }

  private draw(law: HandLaw): void {
    const ground = this.host.ground();
    if (!ground) return;
    const { motion } = ground;
    if (this.drawn?.law === law && this.drawn.motion === motion && this.sketch) return;
    const span = law.span.join(' ');
    if (this.outline?.motion !== ground.motion || this.outline.span !== span)
      this.outline = {
        motion: ground.motion,
        span,
        curve: speedOutline(ground.motion, ground.keys, law.span),
      };
    try {
      this.sketch = sketchPace(motion, this.outline.curve, law);
      this.drawn = { motion, law };
    } catch (error) {
      if (!(error instanceof SlewcurveError)) throw error;
      this.problem = error.message;
    }
  }
}
