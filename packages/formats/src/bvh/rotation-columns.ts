import { EULER_SEQUENCES, type EulerSequence } from '@slewcurve/core';
import type { FileProblem } from '../animation-file.js';
import { lineProblem, quoted } from '../text/text-fault.js';
import type { Hierarchy, Joint } from './hierarchy.js';

/** Where a joint's angles stand in every row, in the order in which they turn. */
export interface RotationColumns {
  readonly joint: number;
  /** Intrinsic: each channel turns about the axes as the ones before left them. */
  readonly sequence: EulerSequence;
  /** Column of each angle that the file has: three, or fewer where a joint turns about fewer axes; the rest are 0. */
  readonly columns: readonly number[];
}

/** The rotation columns of every joint that turns. An order that is no sequence of angles is a problem, `bvh.rotation-order`. */
export function rotationColumns(
  file: string,
  { joints }: Hierarchy,
  problems: FileProblem[],
): RotationColumns[] {
  return joints.flatMap((joint, index) => {
    const turning = joint.channels.flatMap((channel, i) =>
      channel.moves === 'rotation' ? [{ axis: channel.axis, column: joint.firstColumn + i }] : [],
    );
    if (turning.length === 0) return [];
    const axes = turning.map(({ axis }) => axis).join('');
    const sequence = sequenceOf(axes);
    if (sequence !== undefined)
      return [{ joint: index, sequence, columns: turning.map(({ column }) => column) }];
    problems.push(orderProblem(file, joint, axes));
    return [];
  });
}

/** The sequence that begins with these axes; the letters that it has more stand for angles of 0. */
function sequenceOf(axes: string): EulerSequence | undefined {
  return EULER_SEQUENCES.find((sequence) => sequence.startsWith(axes));
}

function orderProblem(file: string, joint: Joint, axes: string): FileProblem {
  return lineProblem(
    file,
    'bvh.rotation-order',
    'error',
    joint.line,
    `${quoted(joint.name)} turns about ${axes.split('').join(', ')}; one to three angles are read, no axis twice in a row. It has no track.`,
  );
}
