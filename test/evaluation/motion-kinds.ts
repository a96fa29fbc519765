type Random = () => number;
/** Degrees about the main axis at a time, seconds. */
type Angle = (time: number) => number;

/** A kind of clean motion: `of` makes one of its kind. */
export interface MotionKind {
  readonly name: string;
  /** A jump on it is a false alarm, without excuse. */
  readonly mustBeClean: boolean;
  of(random: Random, rate: number): Angle;
}

/** Seconds that every motion lasts; what happens in it happens in the middle second. */
export const SECONDS = 4;

/** Minimum-jerk step (Flash and Hogan 1985): 0 to 1, at rest at both ends. */
function step(share: number): number {
  const u = Math.min(Math.max(share, 0), 1);
  return u * u * u * (10 - 15 * u + 6 * u * u);
}

function between(random: Random, least: number, most: number): number {
  return least + random() * (most - least);
}

/** A moment of the middle second, on a frame or anywhere between two. */
function moment(random: Random, rate: number, onFrame = false): number {
  const time = between(random, 1.5, 2.5);
  return onFrame ? Math.round(time * rate) / rate : time;
}

function whip(degrees: number, seconds: number): MotionKind['of'] {
  return (random, rate) => {
    const start = moment(random, rate);
    return (time) => degrees * step((time - start) / seconds);
  };
}

/** A steady turn that stops dead, on a frame, within a number of frames. */
function stop(speed: number, frames: number): MotionKind['of'] {
  return (random, rate) => {
    const start = moment(random, rate, true);
    const seconds = frames / rate;
    return (time) => {
      const over = Math.min(Math.max(time - start, 0), seconds);
      const slowed = seconds > 0 ? (over * over) / (2 * seconds) : 0;
      return speed * (Math.min(time, start) + over - slowed);
    };
  };
}

function waves(random: Random, parts: readonly (readonly [hertz: number, degrees: number])[]): Angle {
  const phased = parts.map(([hertz, degrees]) => ({ hertz, degrees, phase: 2 * Math.PI * random() }));
  return (time) =>
    phased.reduce(
      (sum, { hertz, degrees, phase }) => sum + degrees * Math.sin(2 * Math.PI * hertz * time + phase),
      0,
    );
}

/** The kinds that issue and rule name, in their order. */
export const MOTION_KINDS: readonly MotionKind[] = [
  { name: 'whip, 180° in 0.4 s', mustBeClean: true, of: whip(180, 0.4) },
  { name: 'whip, 90° in 0.25 s', mustBeClean: true, of: whip(90, 0.25) },
  {
    name: 'head shake, peak 780 deg/s',
    mustBeClean: true,
    of: (random) => {
      const degrees = between(random, 25, 40);
      return waves(random, [[780 / (2 * Math.PI * degrees), degrees]]);
    },
  },
  {
    name: 'gait',
    mustBeClean: true,
    of: (random) => {
      const hertz = between(random, 0.8, 1.1);
      return waves(random, [[hertz, 28], [2 * hertz, 12], [3 * hertz, 4], [4 * hertz, 1]]); // prettier-ignore
    },
  },
  {
    name: 'hand-held sway',
    mustBeClean: true,
    of: (random) =>
      waves(
        random,
        Array.from({ length: 12 }, () => [between(random, 0.2, 3), 0.5] as const),
      ),
  },
  {
    name: 'slow pan',
    mustBeClean: true,
    of: (random) => {
      const speed = between(random, 3, 15);
      return (time) => speed * time;
    },
  },
  { name: 'stop from 60 deg/s in two frames', mustBeClean: true, of: stop(60, 2) },
  { name: 'dead stop from 60 deg/s', mustBeClean: true, of: stop(60, 0) },
  { name: 'dead stop from 200 deg/s', mustBeClean: true, of: stop(200, 0) },
  {
    name: 'bounce',
    mustBeClean: true,
    of: (random, rate) => {
      const first = moment(random, rate);
      // Falls from 40° at 800 deg/s² and comes up again with 0.6 of its speed.
      return (time) => {
        const fall = Math.sqrt(0.1);
        let start = first - fall;
        let speed = 0;
        let height = 40;
        if (time < start) return 40;
        for (let bounce = 0; bounce < 8; bounce++) {
          const seconds = height > 0 ? fall : speed / 400;
          const on = time - start;
          if (on < seconds) return height + speed * on - 400 * on * on;
          start += seconds;
          speed = 0.6 * (height > 0 ? 800 * fall : speed);
          height = 0;
        }
        return 0;
      };
    },
  },
  {
    name: 'hinge stop',
    mustBeClean: false,
    of: (random, rate) => {
      const end = moment(random, rate);
      const share = between(random, 0.15, 0.5);
      // A leg of two equal bones whose foot moves away evenly: the knee is straight from `end` on.
      return (time) => (360 / Math.PI) * Math.acos(Math.min(1, 1 - share * (end - time)));
    },
  },
  { name: 'eye jump, 20° in 60 ms', mustBeClean: false, of: whip(20, 0.06) },
  {
    name: 'decaying 15 Hz shake',
    mustBeClean: false,
    of: (random, rate) => {
      const start = moment(random, rate);
      return (time) =>
        time < start ? 0 : 6 * Math.exp((start - time) / 0.2) * Math.sin(2 * Math.PI * 15 * (time - start));
    },
  },
  {
    name: 'spin',
    mustBeClean: false,
    of: (random) => {
      const speed = between(random, 200, 1000);
      return (time) => speed * time;
    },
  },
  {
    name: 'holds between moves',
    mustBeClean: false,
    of: (random) => {
      const turns = [0, 1, 2].map(() => between(random, -60, 60));
      const seconds = between(random, 0.3, 0.6);
      return (time) =>
        turns.reduce((sum, degrees, i) => sum + degrees * step((time - 0.6 - 1.1 * i) / seconds), 0);
    },
  },
];
