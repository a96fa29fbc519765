import type { Ease } from './ease.js';

const { PI, sin, cos } = Math;
const ENDS: readonly number[] = Object.freeze([0, 1]);

const constant: Ease = Object.freeze({
  name: 'constant',
  peakSpeed: 1,
  peakAcceleration: 0,
  peakJerk: 0,
  jumps: 'speed',
  knots: ENDS,
  position: (u: number) => u,
  speed: () => 1,
  acceleration: () => 0,
} satisfies Ease);

/** 3u² − 2u³. */
const cubic: Ease = Object.freeze({
  name: 'cubic',
  peakSpeed: 1.5,
  peakAcceleration: 6,
  peakJerk: 12,
  jumps: 'acceleration',
  knots: ENDS,
  position: (u: number) => u * u * (3 - 2 * u),
  speed: (u: number) => 6 * u * (1 - u),
  acceleration: (u: number) => 6 - 12 * u,
} satisfies Ease);

/** 10u³ − 15u⁴ + 6u⁵: T. Flash and N. Hogan 1985; the 3-4-5 polynomial of cam design. */
const minimumJerk: Ease = Object.freeze({
  name: 'minimum-jerk',
  peakSpeed: 1.875,
  peakAcceleration: 10 / Math.sqrt(3),
  peakJerk: 60,
  jumps: 'none',
  knots: ENDS,
  position: (u: number) => u ** 3 * (10 - 15 * u + 6 * u * u),
  speed: (u: number) => 30 * (u * (1 - u)) ** 2,
  acceleration: (u: number) => 60 * u * (1 - u) * (1 - 2 * u),
} satisfies Ease);

/** 35u⁴ − 84u⁵ + 70u⁶ − 20u⁷: the 4-5-6-7 polynomial of cam design. */
const polynomial4567: Ease = Object.freeze({
  name: 'polynomial-4567',
  peakSpeed: 2.1875,
  peakAcceleration: (84 * Math.sqrt(5)) / 25,
  peakJerk: 52.5,
  jumps: 'none',
  knots: ENDS,
  position: (u: number) => u ** 4 * (35 - 84 * u + 70 * u * u - 20 * u ** 3),
  speed: (u: number) => 140 * (u * (1 - u)) ** 3,
  acceleration: (u: number) => 420 * (u * (1 - u)) ** 2 * (1 - 2 * u),
} satisfies Ease);

/** (1 − cos πu)/2: the simple harmonic of cam design. */
const halfCosine: Ease = Object.freeze({
  name: 'half-cosine',
  peakSpeed: PI / 2,
  peakAcceleration: PI ** 2 / 2,
  peakJerk: PI ** 3 / 2,
  jumps: 'acceleration',
  knots: ENDS,
  position: (u: number) => (1 - cos(PI * u)) / 2,
  speed: (u: number) => (PI / 2) * sin(PI * u),
  acceleration: (u: number) => (PI ** 2 / 2) * cos(PI * u),
} satisfies Ease);

/** u − sin(2πu)/2π. */
const cycloid: Ease = Object.freeze({
  name: 'cycloid',
  peakSpeed: 2,
  peakAcceleration: 2 * PI,
  peakJerk: 4 * PI ** 2,
  jumps: 'none',
  knots: ENDS,
  position: (u: number) => u - sin(2 * PI * u) / (2 * PI),
  speed: (u: number) => 1 - cos(2 * PI * u),
  acceleration: (u: number) => 2 * PI * sin(2 * PI * u),
} satisfies Ease);

/** Speed scale of the modified sine: what makes the position end at 1. */
const SINE = PI / (4 + PI);

/**
 * The modified sine of cam design: acceleration a quarter of a fast sine over the first and last eighth, and half of a slow one between,
 * so that speed, acceleration and its slope's sign fit together. With c = π/(4 + π): s′ = c(1 − cos 4πu), then c(1 − 3 cos(4πu/3 + π/3)).
 */
const modifiedSine: Ease = Object.freeze({
  name: 'modified-sine',
  peakSpeed: 4 * SINE,
  peakAcceleration: 4 * PI * SINE,
  peakJerk: 16 * PI ** 2 * SINE,
  jumps: 'none',
  knots: Object.freeze([0, 1 / 8, 7 / 8, 1]),
  position(u: number) {
    if (u < 1 / 8) return SINE * (u - sin(4 * PI * u) / (4 * PI));
    if (u > 7 / 8) return 1 - SINE * (1 - u - sin(4 * PI * (1 - u)) / (4 * PI));
    return SINE * (2 / PI + u - (9 / (4 * PI)) * sin((4 * PI * u) / 3 + PI / 3));
  },
  speed(u: number) {
    const v = Math.min(u, 1 - u);
    return SINE * (v < 1 / 8 ? 1 - cos(4 * PI * v) : 1 - 3 * cos((4 * PI * v) / 3 + PI / 3));
  },
  acceleration(u: number) {
    const v = Math.min(u, 1 - u);
    const size = 4 * PI * SINE * (v < 1 / 8 ? sin(4 * PI * v) : sin((4 * PI * v) / 3 + PI / 3));
    return u > 0.5 ? -size : size;
  },
} satisfies Ease);

/** Names of the easing laws. */
export type EaseName =
  'constant' | 'cubic' | 'minimum-jerk' | 'polynomial-4567' | 'half-cosine' | 'cycloid' | 'modified-sine';

/**
 * Laws of easing without numbers of their own, by name; formulas from memory, peaks as cam design's tables print them. Those with
 * numbers are `rampEase` and `cubicBezierEase`.
 */
export const EASES: Readonly<Record<EaseName, Ease>> = Object.freeze({
  constant,
  cubic,
  'minimum-jerk': minimumJerk,
  'polynomial-4567': polynomial4567,
  'half-cosine': halfCosine,
  cycloid,
  'modified-sine': modifiedSine,
});
