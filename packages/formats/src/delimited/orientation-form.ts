import {
  fromAxisAngle,
  SlewcurveError,
  splitMatrix,
  toAxisAngle,
  toMat3,
  type RotationTrackInput,
  type Storage,
} from '@slewcurve/core';
import type { Form } from './layout.js';

/** How a form's numbers become a track's, and back. Angles of a form in degrees are degrees on the text's side alone. */
export interface OrientationForm {
  readonly track: Pick<RotationTrackInput, 'interpolation' | 'sequence'>;
  /** Numbers that a key takes in the track. */
  readonly perKey: number;
  /** A key's numbers from the text's. Never throws; what holds no orientation is NaN. */
  read(text: readonly number[]): readonly number[];
  /** The text's numbers from a key's; `was` are those that stand there. */
  write(key: readonly number[], was: readonly number[]): readonly number[];
  /** Noise floor of text with so many decimals in each column. */
  storage(decimals: readonly number[]): Pick<Storage, 'component' | 'decimals' | 'lattice'>;
  /** Of a matrix: what keeps it from being a turn and a scale. Undefined where it holds no orientation. */
  flaw?(text: readonly number[]): { readonly reflected: boolean; readonly shear: number } | undefined;
}

const DEGREE = Math.PI / 180;

/** The form of a body's numbers. */
export function orientationForm(form: Form): OrientationForm {
  switch (form.kind) {
    case 'quaternion':
      return QUATERNION;
    case 'angles':
      return anglesForm(form);
    case 'axis-angle':
      return axisAngleForm(form.unit === 'deg' ? DEGREE : 1);
    default:
      return MATRIX;
  }
}

const QUATERNION: OrientationForm = {
  track: { interpolation: 'LINEAR' },
  perKey: 4,
  read: (text) => text,
  write: (key) => key,
  storage: (decimals) => ({ component: 'text', decimals: Math.max(...decimals) }),
};

function anglesForm({ sequence, parts, unit }: Form & { kind: 'angles' }): OrientationForm {
  const radians = unit === 'deg' ? DEGREE : 1;
  return {
    track: { interpolation: 'EULER', sequence },
    perKey: 3,
    read(text) {
      const key = [0, 0, 0];
      parts.forEach((part, i) => (key[part] = (text[i] ?? NaN) * radians));
      return key;
    },
    write: (key) => parts.map((part) => (key[part] ?? NaN) / radians),
    storage(decimals) {
      const most = Math.max(...decimals);
      // The floor of angles in text is 1.5 steps of degrees; in radians the step is given as the lattice, twice which is the floor.
      return { component: 'text', decimals: most, ...(unit === 'rad' && { lattice: 0.75 * 10 ** -most }) };
    },
  };
}

function axisAngleForm(radians: number): OrientationForm {
  return {
    track: { interpolation: 'LINEAR' },
    perKey: 4,
    read: ([x = NaN, y = NaN, z = NaN, angle = NaN]) =>
      Number.isFinite(x + y + z + angle)
        ? fromAxisAngle([0, 0, 0, 1], [x, y, z], angle * radians)
        : [NaN, NaN, NaN, NaN],
    write(key, [x = 0, y = 0, z = 0, angle = 0]) {
      const axis: [number, number, number] = [0, 0, 0];
      const size = Math.hypot(x, y, z);
      const turn = toAxisAngle(axis, key);
      const same = axis[0] * x + axis[1] * y + axis[2] * z >= 0 ? 1 : -1;
      const whole = 2 * Math.PI;
      const turned = same * turn + whole * Math.round((angle * radians - same * turn) / whole);
      const length = same * (size > 0 ? size : 1);
      // No turn has no axis: what stands there stays.
      if (turn === 0 && size > 0) return [x, y, z, turned / radians];
      return [...axis.map((part) => part * length), turned / radians];
    },
    storage(decimals) {
      const axis = 10 ** -Math.max(...decimals.slice(0, 3));
      const angle = 10 ** -(decimals[3] ?? 0) * radians;
      // Half a step of each axis component turns the axis by √3/2 steps at most, the orientation by twice that at half a turn.
      return {
        component: 'text',
        decimals: Math.max(...decimals),
        lattice: (Math.sqrt(3) * axis + 0.5 * angle) / 2,
      };
    },
  };
}

const MATRIX: OrientationForm = {
  track: { interpolation: 'LINEAR' },
  perKey: 4,
  read: (text) => split(text)?.orientation ?? [NaN, NaN, NaN, NaN],
  write(key, was) {
    const scale = split(was)?.scale ?? [1, 1, 1];
    return toMat3(Array<number>(9).fill(0), key).map((part, i) => part * (scale[Math.floor(i / 3)] ?? 1));
  },
  storage: (decimals) => ({ component: 'text', decimals: Math.max(...decimals) }),
  flaw: split,
};

function split(text: readonly number[]): ReturnType<typeof splitMatrix> | undefined {
  try {
    return splitMatrix(text);
  } catch (error) {
    if (error instanceof SlewcurveError) return undefined;
    throw error;
  }
}
