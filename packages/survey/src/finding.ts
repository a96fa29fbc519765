import type { Step } from '@slewcurve/mend';

/** How bad: SARIF 2.1.0's words. */
export type Level = 'error' | 'warning' | 'note';

/** One place of a finding. Keys zero-based, times seconds, values in the finding's unit. */
export interface Occurrence {
  readonly keys: readonly number[];
  readonly time: number;
  readonly frame?: number;
  readonly span: readonly [number, number];
  readonly value: number;
  /** Where it is another than the finding's. */
  readonly limit?: number;
  /** Where it is another than the finding's. */
  readonly playback?: string;
  readonly level: Level;
  readonly confidence?: number;
  readonly remedy?: Step;
  /** What the remedy costs: the largest turn of a key that it moves, degrees. */
  readonly price?: number;
  /** Other remedies that a person may prefer. */
  readonly alternatives?: readonly Step[];
  /** turn.half: the two ways round, own frame; angle in degrees. */
  readonly ways?: readonly Way[];
  /** This place in a sentence. */
  readonly message: string;
  readonly fingerprint: string;
}

/** One way of turning between two keys: axis in own frame, degrees. */
export interface Way {
  readonly axis: readonly [number, number, number];
  readonly angle: number;
}

/** All places where one rule finds one track at fault. Its own numbers are those of the worst place. Data; the rule says it in words. */
export interface Finding {
  readonly rule: string;
  readonly level: Level;
  readonly clip: string;
  readonly track: string;
  readonly keys: readonly number[];
  readonly span: readonly [number, number];
  readonly time: number;
  readonly frame?: number;
  readonly value: number;
  readonly unit: string;
  readonly limit: number;
  readonly playback: string;
  readonly owner: string;
  readonly confidence?: number;
  readonly effect?: { readonly value: number; readonly unit: string };
  readonly count: number;
  /** Worst first, up to a limit; `count` is whole. */
  readonly occurrences: readonly Occurrence[];
  readonly remedy?: Step;
  readonly price?: number;
  readonly alternatives?: readonly Step[];
  readonly ways?: readonly Way[];
  /** What the remedy leaves alone, in words. */
  readonly untouched?: string;
  readonly message: string;
  readonly fingerprint: string;
}
