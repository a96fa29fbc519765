import { existsSync, readFileSync } from 'node:fs';

/** One time of a curve: orientation, and rate and acceleration in own axes. */
export interface ReferenceSample {
  readonly t: number;
  readonly quat: readonly number[];
  readonly rate_body: readonly number[];
  readonly accel_body: readonly number[];
}

interface Spline {
  readonly times: readonly number[];
  readonly quats: readonly (readonly number[])[];
  readonly at: readonly number[];
}

interface FourControls {
  readonly control: readonly (readonly number[])[];
  /** `t` is the fraction, 0 to 1. */
  readonly samples: readonly ReferenceSample[];
}

interface Hermite {
  readonly q0: readonly number[];
  readonly q1: readonly number[];
  readonly rate0_body: readonly number[];
  readonly rate1_body: readonly number[];
}

/** Cases of every group by its file. The spelling of the fields is the files'. */
export interface ReferenceGroups {
  readonly 'fifty-digit.json': {
    readonly nlerp: {
      readonly q0: readonly number[];
      readonly q1: readonly number[];
      readonly h: number;
      readonly samples: readonly ReferenceSample[];
    };
    readonly squad: {
      readonly rule: 'uniform-shoemake' | 'secant' | 'bessel';
      readonly times: readonly number[];
      readonly quats: readonly (readonly number[])[];
      /** `t` is on the clock of `times`. */
      readonly samples: readonly ReferenceSample[];
    };
    readonly gltf_cubicspline: {
      readonly v0: readonly number[];
      readonly out_tangent0: readonly number[];
      readonly v1: readonly number[];
      readonly in_tangent1: readonly number[];
      readonly td: number;
      readonly samples: readonly ReferenceSample[];
    };
    readonly cumulative_hermite: Hermite & {
      readonly h: number;
      readonly samples: readonly ReferenceSample[];
    };
    readonly cumulative_bezier: FourControls;
    readonly cumulative_bspline: FourControls;
    readonly slerp_de_casteljau: FourControls;
    readonly kochanek_bartels_rates: {
      readonly prev: readonly number[];
      readonly key: readonly number[];
      readonly next: readonly number[];
      readonly h_prev: number;
      readonly h_next: number;
      readonly tension: number;
      readonly continuity: number;
      readonly bias: number;
      readonly incoming_rate_body: readonly number[];
      readonly outgoing_rate_body: readonly number[];
    };
    readonly multi_turn: {
      readonly q0: readonly number[];
      readonly q1: readonly number[];
      readonly extra_turns: number;
      readonly total_angle_rad: number;
      readonly samples: readonly { readonly u: number; readonly quat: readonly number[] }[];
    };
    readonly eased_slerp: {
      readonly ease: string;
      readonly q0: readonly number[];
      readonly q1: readonly number[];
      readonly h: number;
      readonly samples: readonly ReferenceSample[];
    };
    readonly arc_length: Hermite & {
      readonly total_turned_angle_rad: number;
      readonly geodesic_angle_rad: number;
    };
  };
  readonly 'scipy-1.10.1.json': {
    readonly slerp: Spline & {
      readonly kind: string;
      readonly expected: readonly (readonly number[])[];
    };
    readonly rotvec: {
      readonly rotvec: readonly number[];
      readonly quat: readonly number[];
      readonly principal_rotvec: readonly number[];
      readonly angle_rad: number;
    };
    readonly product: {
      readonly a: readonly number[];
      readonly b: readonly number[];
      readonly a_times_b: readonly number[];
      readonly a_inverse_times_b: readonly number[];
      readonly angle_between_rad: number;
      readonly vector: readonly number[];
      readonly a_applied_to_vector: readonly number[];
    };
    readonly rotation_spline: Spline & {
      readonly expected_quat: readonly (readonly number[])[];
      readonly expected_rate_body: readonly (readonly number[])[];
      readonly expected_accel_body: readonly (readonly number[])[];
    };
    readonly euler: {
      readonly seq: string;
      readonly angles_deg: readonly number[];
      readonly quat: readonly number[];
      readonly principal_angles_deg: readonly number[];
      readonly lock_amplification: number;
    };
    readonly matrix: {
      readonly quat: readonly number[];
      readonly matrix_rows: readonly (readonly number[])[];
    };
    readonly mean: {
      readonly quats: readonly (readonly number[])[];
      readonly weights: readonly number[];
      readonly expected: readonly number[];
      readonly relative_eigen_gap: number;
    };
  };
}

/** Where the whole sets lie when they are at hand; relative to the root of the repository, where tests run. */
const WHOLE = '../shared/reference';
/** A few cases of every group, committed. */
const PART = 'test/data/reference';

/**
 * The cases of one group: of the whole set where that is at hand, else of the committed part, which is said aloud. What made
 * them stands in each file under `source` or `meta`.
 */
export function referenceValues<
  File extends keyof ReferenceGroups,
  Group extends keyof ReferenceGroups[File] & string,
>(file: File, group: Group): readonly ReferenceGroups[File][Group][] {
  const whole = existsSync(`${WHOLE}/${file}`);
  if (!whole) console.warn(`${WHOLE}/${file} is not here: only the committed part of "${group}" is tested.`);
  // The files' shape is what the tests assert; a wrong one fails there.
  // oxlint-disable-next-line typescript/no-unsafe-type-assertion
  const groups = JSON.parse(readFileSync(`${whole ? WHOLE : PART}/${file}`, 'utf8')) as Record<
    Group,
    readonly ReferenceGroups[File][Group][]
  >;
  return groups[group];
}
