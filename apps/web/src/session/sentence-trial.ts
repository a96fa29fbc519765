import type { RotationTrack } from '@slewcurve/core';
import type { Motion } from '@slewcurve/elements/plot';
import type { TrialAnswer } from '@slewcurve/job';
import type { Step } from '@slewcurve/mend';
import { LatestOnly } from './latest-only.js';
import { readSentence, refused, tried, type SentenceAtHand } from './sentence-at-hand.js';

/** What a sentence is tried with. */
export interface TrialHost {
  /** What it is tried on, and the frames per second by which times may be written. */
  ground(): { readonly track: RotationTrack; readonly frameRate: number | undefined } | undefined;
  ask(step: Step): Promise<TrialAnswer>;
  /** Measures what a preview's picture needs, without holding the page up. */
  measure(preview: RotationTrack): Promise<unknown>;
  requestUpdate(): void;
}

/** The result before may be shown for so long while another is worked out; then the sketch is, ms. */
const STALE_MS = 100;
/** A result that takes longer is told to be on its way, ms. */
const LONG_MS = 300;

/**
 * The sentence at hand and its trial by the desk. It is read at once; what it would make, and its price, come when they are worked out, the latest alone. Until
 * then the sketch of the hand that made it is shown.
 */
export class SentenceTrial {
  sentence: SentenceAtHand | undefined;
  /** What the hand at work makes of the motion, as far as it can be sketched; until the exact result is there. */
  sketch: Motion | undefined;
  /** The sentence as it was tried; undefined where it was left, or another came after it. */
  settled: Promise<SentenceAtHand | undefined> = Promise.resolve(undefined);
  readonly #host: TrialHost;
  readonly #latest = new LatestOnly();
  #timers: ReturnType<typeof setTimeout>[] = [];

  constructor(host: TrialHost) {
    this.#host = host;
  }

  /** Takes a sentence up, or another text for the one at hand. */
  begin(text: string, time: number, sketch?: Motion): void {
    const ground = this.#host.ground();
    if (!ground) return;
    const read = readSentence(text, time, ground.frameRate);
    const { step } = read;
    this.sketch = sketch;
    if (!step) {
      this.#latest.leave();
      this.#put(read);
      return;
    }
    const preview = this.sentence?.preview;
    this.sentence = { ...read, ...(preview && { preview }) };
    this.#awaitLong();
    this.settled = this.#try(read, step, ground.track);
    this.#host.requestUpdate();
  }

  /** A hand is at work again: the result before is no more. */
  sketching(sketch: Motion | undefined): void {
    this.#latest.leave();
    this.#rest();
    this.sketch = sketch;
    if (this.sentence) this.sentence = { ...withoutPreview(this.sentence), price: '' };
    this.#host.requestUpdate();
  }

  leave(): void {
    this.#latest.leave();
    this.sketch = undefined;
    this.#put(undefined);
  }

  async #try(read: SentenceAtHand, step: Step, track: RotationTrack): Promise<SentenceAtHand | undefined> {
    const made = await this.#latest.run(async () => {
      try {
        const answer = await this.#host.ask(step);
        if (answer.after) await this.#host.measure(answer.after);
        return tried(read, answer, track);
      } catch (error) {
        return refused(read, error);
      }
    });
    if (!made) return undefined;
    this.sketch = undefined;
    this.#put(made);
    return made;
  }

  #put(sentence: SentenceAtHand | undefined): void {
    this.#rest();
    this.sentence = sentence;
    this.settled = Promise.resolve(sentence);
    this.#host.requestUpdate();
  }

  /** From the first that is not answered on: one that is changed again and again must not wait for ever. */
  #awaitLong(): void {
    if (this.#timers.length > 0) return;
    const change = (next: (sentence: SentenceAtHand) => SentenceAtHand) => (): void => {
      if (this.sentence) this.sentence = next(this.sentence);
      this.#host.requestUpdate();
    };
    this.#timers = [
      setTimeout(change(withoutPreview), STALE_MS),
      setTimeout(
        change((sentence) => ({ ...sentence, price: 'Working out the exact result.' })),
        LONG_MS,
      ),
    ];
  }

  #rest(): void {
    for (const timer of this.#timers) clearTimeout(timer);
    this.#timers = [];
  }
}

function withoutPreview({ text, time, step, price, problem }: SentenceAtHand): SentenceAtHand {
  return { text, time, price, problem, ...(step && { step }) };
}
