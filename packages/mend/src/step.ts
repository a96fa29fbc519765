import type { PlaybackId } from '@slewcurve/core';

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
  /** Pace verbs: whose times are mapped along, so that what belongs together stays together. Default node. */
  readonly with?: 'node' | 'track' | 'clip';
  /**
   * Pace verbs: how the new pace is stored. `move`: the keys travel, their values stay to the bit. `frames`: the path is read at the frames. `cubic`: as
   * CUBICSPLINE with exact tangents. Default: what the verb needs.
   */
  readonly store?: 'move' | 'frames' | 'cubic';
  /**
   * Pace verbs: whether both ends keep their times and orientations (`same`), or what follows comes earlier or later (`run`). shape alone: or the times stay
   * and the angle goes (`go`), so that what follows is re-seated.
   */
  readonly ends?: 'same' | 'run' | 'go';
  /** hold: for how long; stretch, shrink, even out, ease in/out: how long the span is to last. Seconds. */
  readonly seconds?: number;
  /** hold, shape: where, old seconds. */
  readonly at?: number;
  /** cap: the most, deg/s. */
  readonly rate?: number;
  /** cap: the most with bends counted, deg/s². */
  readonly acceleration?: number;
  /** ease in/out: by which law, as `easeOf` reads it: "minimum-jerk", "trapezoid 0.3", "s-curve 0.3", "cubic-bezier(0.42, 0, 0.58, 1)". */
  readonly ease?: string;
  /** ease in/out with shoulders: at one end alone. */
  readonly which?: 'in' | 'out';
  /**
   * cap, ease in/out, even out: what becomes of the corners that a path of great arcs turns at its keys, where no speed keeps an acceleration finite. `round`:
   * the path is rounded, `within` so many degrees. `stop`: it comes to rest at each. Default: `round` for cap with an acceleration, else they stay.
   */
  readonly corners?: 'round' | 'stop';
  /** lay over: by what to turn, a rotation vector in degrees. */
  readonly turn?: readonly [number, number, number];
  /** lay over: about whose axes. Default own. */
  readonly about?: 'own' | 'parent' | 'world';
  /** whole turns: how many beside the short way, about its axis; negative ones the other way. */
  readonly turns?: number;
  /** shape: by how much the speed is pressed up or down, deg/s. */
  readonly by?: number;
  /** shape: how far the press reaches on either side, seconds. */
  readonly reach?: number;
  /** shape: the speed as drawn, pairs of a time and a speed, seconds and deg/s, times ascending; scaled so that the span turns as far as before. */
  readonly speeds?: readonly (readonly [time: number, speed: number])[];
  /** set marks: pairs of an old time and the time at which what stood there is to stand, seconds, ascending. */
  readonly marks?: readonly (readonly [old: number, time: number])[];
  /** copy pace, match: the other track, by its name or a pattern that fits one alone. Default: the track itself. */
  readonly fromTrack?: string;
  /** copy pace, match: the clip of the other track. Default: the track's own. */
  readonly fromClip?: string;
  /** copy pace: between which of the other's times. Default: all of it. */
  readonly fromSpan?: readonly [number, number];
  /** match: the speed that both sides are to have, deg/s. Default: the mean of both; that of another track, where one is named. */
  readonly meet?: number;
  /** restate: the new axes out of the old ones, as `axisChange` reads it: "x z -y". */
  readonly axes?: string;
  /** restate: what the four stored numbers really are, in their order; they were read as xyzw. */
  readonly components?: string;
  /** restate: what unit the stored angles really have; they were read in the other one. */
  readonly angles?: 'degrees' | 'radians';
  /** change space: in whose axes the orientations are to be written. */
  readonly space?: 'world' | 'parent';
  /** mirror: the axis that stands square to the mirror, in parent's axes. */
  readonly normal?: 'x' | 'y' | 'z';
  /** mirror: parts of names that change places, so that left takes what right does. */
  readonly pairs?: readonly (readonly [string, string])[];
  /** convert: how the keys are to be joined. */
  readonly interpolation?: 'LINEAR' | 'CUBICSPLINE';
  /** convert, re-grid, smooth: the most that the motion may differ, degrees. Pace verbs that round corners: how far off them they may go; default 0.1. */
  readonly within?: number;
  /** re-grid, re-time to grid: frames per second. */
  readonly fps?: number;
  /** re-grid: frames per second of the motion before frames were repeated to fill a faster grid. */
  readonly source?: number;
  /** re-grid: the playback whose motion is sampled. Default as written. */
  readonly playback?: PlaybackId;
  /** set tangents: those that arrive at keys, or those that leave them, alone. */
  readonly tangents?: 'in' | 'out';
  /** smooth: standard deviation of the average, seconds. */
  readonly sigma?: number;
  /** smooth, instead of `sigma`: the grain that may be left, degrees an axis. */
  readonly grain?: number;
  /** smooth: what turns faster is guarded, deg/s. */
  readonly guard?: number;
  /** smooth: guarded spans (whips, contacts), seconds. */
  readonly guards?: readonly (readonly [from: number, to: number])[];
  /** take out hum: its frequency. */
  readonly hertz?: number;
  /** close loop: over its tail, or in proportion to time. */
  readonly spread?: 'tail' | 'evenly';
  /** take out drift: the end or ends of the span whose pose is kept. */
  readonly anchor?: 'start' | 'end' | 'both';
}
