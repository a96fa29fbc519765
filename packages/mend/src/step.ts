/**
 * One edit, as a job card writes it (flat JSON): what to do, on which clip and track, and the verb's own numbers. Keys are
 * zero-based, times seconds of the file's own clock, angles degrees.
 */
export interface Step {
  readonly verb: string;
  /** Name or pattern (`*` matches anything). */
  readonly clip: string;
  readonly track: string;
  /** The keys acted on; what they mean is the verb's. */
  readonly keys?: readonly number[];
  readonly span?: readonly [number, number];
  /** Fade length at both ends of the span, seconds. */
  readonly shoulders?: number;
  /** Keys whose stored numbers must not change. */
  readonly keep?: readonly number[];
  /** choose side: turn axis in the own frame of the earlier key. */
  readonly axis?: readonly [number, number, number];
  /** re-seat: on which side the fitted turn is applied. */
  readonly side?: 'own' | 'parent';
  /** re-seat: seconds over which the offset fades away; left out: never. */
  readonly fade?: number;
  /** bridge: number of key steps that the bridge spans. */
  readonly steps?: number;
}
