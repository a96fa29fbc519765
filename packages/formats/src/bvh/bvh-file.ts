import {
  FRAME_RATES,
  SlewcurveError,
  frameGrid,
  storedTrack,
  type Clip,
  type RotationTrack,
  type SceneNode,
} from '@slewcurve/core';
import type { AnimationFile, FileProblem, Follower } from '../animation-file.js';
import { nodePaths } from '../node-paths.js';
import type { Source } from '../source.js';
import { textLines } from '../text/text-lines.js';
import { type Hierarchy, hierarchyReader } from './hierarchy.js';
import { type Motion, type MotionReader, motionReader } from './motion.js';
import { type RotationColumns, rotationColumns } from './rotation-columns.js';
import { type ReadJoint, writePlan } from './write-plan.js';

const RADIANS = Math.PI / 180;
/** Share of a frame beyond which a Frame Time is another rate, not a usual one cut short. */
const FARTHEST = 0.05;

/** A BVH file is one clip, named after the section that holds it. */
const CLIP = 'MOTION';

/**
 * Reads a BVH file into EULER tracks, one a joint that turns. There is no standard of the format; this is what programs agree on
 * (M. Meredith and S. Maddock, "Motion Capture File Formats Explained", 2001, from memory): angles are degrees, each channel turns
 * about the joint's own axes as the channels before left them, rows are `Frame Time` apart, the first at 0. The node tree has the
 * OFFSETs and no turn at rest; the pose in row 0 is a key like any other.
 *
 * @throws SlewcurveError the `bvh.`, `text.` and `source.` codes of a damaged file
 */
export async function bvhFile(source: Source, name: string): Promise<AnimationFile> {
  const problems: FileProblem[] = [];
  const { hierarchy, columns, motion, motionAt } = await readSections(source, name, problems);
  const nodes = nodesOf(hierarchy);
  const joints = readJoints(nodes, columns, motion);
  const roundedTime = roundedFrameTime(name, motion);
  if (roundedTime) problems.push(roundedTime);
  return Object.freeze({
    format: 'bvh',
    fixedTimes: true,
    nodes: Object.freeze(nodes),
    clips: Object.freeze([clipOf(joints.map(({ track }) => track))]),
    problems: Object.freeze(problems),
    plan: (changed: readonly RotationTrack[], _followers?: readonly Follower[], axes?: readonly string[]) =>
      writePlan(source, name, motionAt, joints, changed, axes),
  });
}

interface Sections {
  readonly hierarchy: Hierarchy;
  readonly columns: readonly RotationColumns[];
  readonly motion: Motion;
  /** Number of the line MOTION. */
  readonly motionAt: number;
}

async function readSections(source: Source, file: string, problems: FileProblem[]): Promise<Sections> {
  const reader = hierarchyReader(file, problems);
  let open: { hierarchy: Hierarchy; columns: RotationColumns[]; rows: MotionReader; at: number } | undefined;
  for await (const lines of textLines(source, file))
    for (const line of lines) {
      if (open) open.rows.take(line);
      else if (reader.take(line)) {
        const hierarchy = reader.done();
        const columns = rotationColumns(file, hierarchy, problems);
        const wanted = columns.flatMap((joint) => joint.columns);
        const rows = motionReader(file, problems, hierarchy.columns, wanted);
        open = { hierarchy, columns, rows, at: line.number };
      }
    }
  if (!open)
    throw new SlewcurveError(
      'bvh.truncated',
      `${file}: the file ends before MOTION; it is cut or holds a skeleton alone.`,
      { file, byte: source.size },
    );
  return { hierarchy: open.hierarchy, columns: open.columns, motion: open.rows.done(), motionAt: open.at };
}

function nodesOf({ joints }: Hierarchy): SceneNode[] {
  const paths = nodePaths(
    joints.map(({ name }) => name),
    joints.map(({ parent }) => parent),
  );
  return joints.map(({ name, parent, offset, endSite }, index) => ({
    path: paths[index] ?? `#${index}`,
    ...(name !== '' && { name }),
    parent,
    rotation: [0, 0, 0, 1],
    translation: offset,
    scale: [1, 1, 1],
    joint: !endSite,
  }));
}

function readJoints(
  nodes: readonly SceneNode[],
  columns: readonly RotationColumns[],
  motion: Motion,
): ReadJoint[] {
  const times = Float64Array.from({ length: motion.rows }, (_, row) => row * motion.frameTime);
  let kept = 0;
  return columns.map(({ joint, sequence, columns: own }) => {
    const first = kept;
    kept += own.length;
    const values = new Float64Array(3 * motion.rows);
    for (let row = 0; row < motion.rows; row++)
      for (let part = 0; part < own.length; part++)
        values[3 * row + part] = motion.value(row, first + part) * RADIANS;
    const decimals = Math.max(...motion.decimals.slice(first, kept));
    const track = storedTrack({
      id: nodes[joint]?.path ?? `#${joint}`,
      clip: CLIP,
      times,
      values,
      interpolation: 'EULER',
      sequence,
      storage: {
        component: 'text',
        decimals,
        timeComponent: 'text',
        timeDecimals: motion.frameTimeDecimals,
      },
      source: { clip: CLIP, clipIndex: 0, node: joint, values: own[0] ?? 0, sharedWith: [] },
    });
    return { track, columns: own, decimals };
  });
}

function clipOf(tracks: readonly RotationTrack[]): Clip {
  const times = tracks[0]?.times ?? new Float64Array(0);
  const frameRate = frameGrid([times]);
  return Object.freeze({
    name: CLIP,
    index: 0,
    tracks: Object.freeze(tracks),
    start: times[0] ?? 0,
    end: times.at(-1) ?? 0,
    ...(frameRate !== undefined && { frameRate }),
    loop: false,
    marks: Object.freeze([]),
  });
}

/**
 * A Frame Time that is a usual rate cut to too few places: speeds read too high or low by the same share everywhere. Told where the
 * clip is off by half a frame at its end, or by 0.5 %.
 */
function roundedFrameTime(file: string, motion: Motion): FileProblem | undefined {
  const { frameTime, frameTimeDecimals, rows } = motion;
  const step = 10 ** -frameTimeDecimals;
  const near = FRAME_RATES.filter((rate) => Math.abs(1 / rate - frameTime) < step);
  const exact = near.reduce<number | undefined>(
    (best, rate) =>
      best === undefined || Math.abs(1 / rate - frameTime) < Math.abs(1 / best - frameTime) ? rate : best,
    undefined,
  );
  if (exact === undefined) return undefined;
  const share = 1 / exact / frameTime - 1;
  const drift = Math.abs(share) * frameTime * Math.max(0, rows - 1);
  const rounded = Math.abs(share) >= 0.005 || drift >= 0.5 / exact;
  if (!rounded || Math.abs(share) > FARTHEST) return undefined;
  const percent = Math.abs(share * 100).toPrecision(3);
  return {
    code: 'bvh.rounded-frame-time',
    level: 'note',
    message: `${file}: Frame Time ${frameTime} is 1/${exact} s in ${frameTimeDecimals} decimals: speeds read ${percent} % too ${share > 0 ? 'high' : 'low'}, and the clip drifts ${Math.abs(share * 60).toPrecision(3)} s a minute. Write the time in full.`,
    place: { file },
  };
}
