import { html, type TemplateResult } from 'lit';
import {
  NO_TURN,
  nearestKey,
  type About,
  type ChartData,
  type HandEdit,
  type Turn,
} from '@slewcurve/elements/plot';

/** How the key under the cursor is being turned on the page. */
export interface Turning {
  /** A drag on the globe turns it, rather than looking round. */
  readonly on: boolean;
  readonly about: About;
}

export const NOT_TURNING: Turning = { on: false, about: 'own' };

/** The key that a turn acts on: the one at hand, else the one nearest the cursor. */
export function turnedKey(data: ChartData, time: number, edit: HandEdit | undefined): number {
  const [held] = edit?.verb === 'lay over' ? (edit.keys ?? []) : [];
  return held ?? nearestKey((data.tried && data.before?.keys) || data.keys, time);
}

/** The turn at hand, if that is what is at hand. */
export function turnAtHand(edit: HandEdit | undefined): Turn {
  return (edit?.verb === 'lay over' && edit.turn) || NO_TURN;
}

/** The step that a turn of a key is. */
export function layOverEdit(key: number, turn: Turn, about: About): HandEdit {
  return { verb: 'lay over', keys: [key], turn, about };
}

/** Numbers and axes of one key's orientation, and what a drag on the globe does. */
export function keyTurnOf(
  data: ChartData,
  key: number,
  turning: Turning,
  edit: HandEdit | undefined,
  events: { turning(next: Turning): void; turn(turn: Turn, about: About): void },
): TemplateResult {
  const base = (data.tried && data.before) || data;
  const time = ('keys' in base && base.keys ? base.keys : data.keys)[key] ?? 0;
  return html`<slew-key-turn
    .key=${key}
    .time=${time}
    .orientation=${key < 0 ? undefined : base.motion.orientation(time)}
    .turn=${turnAtHand(edit)}
    .about=${turning.about}
    .turning=${turning.on}
    @turning-chosen=${(event: CustomEvent<{ turning: boolean }>) => events.turning({ ...turning, on: event.detail.turning })}
    @about-chosen=${(event: CustomEvent<{ about: About }>) => events.turning({ ...turning, about: event.detail.about })}
    @turn-typed=${(event: CustomEvent<{ turn: Turn; about: About }>) => events.turn(event.detail.turn, event.detail.about)}
  ></slew-key-turn>`;
}
