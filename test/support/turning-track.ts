import { type Interpolation, type RotationTrack, rotationTrack } from '@slewcurve/core';

type Axis = readonly [number, number, number];

/** Keys `rate` a second, each turned by `angle(key)` degrees about one unit axis, own and parent alike. */
export function turningTrack(
  angle: (key: number) => number,
  count: number,
  rate = 30,
  { axis = [0, 1, 0], interpolation = 'LINEAR' }: { axis?: Axis; interpolation?: Interpolation } = {},
): RotationTrack {
  const keys = Array.from({ length: count }, (_, key) => key);
  const values = keys.flatMap((key) => {
    const half = (angle(key) * Math.PI) / 360;
    const value = [...axis.map((part) => part * Math.sin(half)), Math.cos(half)];
    const still = [0, 0, 0, 0];
    return interpolation === 'CUBICSPLINE' ? [...still, ...value, ...still] : value;
  });
  return rotationTrack({
    times: keys.map((key) => key / rate),
    values,
    interpolation,
    id: 'Arm',
    clip: 'Wave',
  });
}
