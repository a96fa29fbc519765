import { describe, expect, test } from 'vitest';
import { expMap, multiply, rotationTrack, type RotationTrack } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { surveyTrack } from '@slewcurve/survey';

const turn = (x: number, y: number, by: number): Float64Array =>
  expMap(new Float64Array(4), [(x * by * Math.PI) / 180, (y * by * Math.PI) / 180, 0]);

/** 40° about y in a second, then `degrees` about an axis in the plane of y and x, in parent axes, in a second. */
function bent(angle: number, degrees = 40): RotationTrack {
  const first = turn(0, 1, 40);
  const bend = (angle * Math.PI) / 180;
  const second = multiply(new Float64Array(4), turn(Math.sin(bend), Math.cos(bend), degrees), first);
  return rotationTrack({ times: [0, 1, 2], values: [0, 0, 0, 1, ...first, ...second] });
}

const corner = (angle: number, degrees?: number) =>
  surveyTrack(bent(angle, degrees)).find(({ rule }) => rule === 'pace.axis-kick');

describe('pace.axis-kick', () => {
  test('an axis that bends by 70° at a level speed is named with that angle', () => {
    expect(corner(70)).toMatchObject({ level: 'warning', keys: [1], unit: 'deg', limit: 30 });
    expect(corner(70)!.value).toBeCloseTo(70, 3);
  });

  test('a smooth way through the same keys has no kick', () => {
    const { remedy } = corner(70)!;
    expect(remedy).toMatchObject({ verb: 'ease through' });
    const eased = verbNamed('ease through').apply(bent(70), remedy!).track;
    expect(surveyTrack(eased).map(({ rule }) => rule)).not.toContain('pace.axis-kick');
  });

  test('20°, and a corner where the speed changes as well, are none', () => {
    expect(corner(20)).toBeUndefined();
    expect(corner(70, 20)).toBeUndefined();
  });
});
