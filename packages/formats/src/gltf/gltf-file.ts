import { type RotationTrack, SlewcurveError } from '@slewcurve/core';
import type { AnimationFile, Follower, OpenOptions } from '../animation-file.js';
import { member, shown, textMember } from '../json-value.js';
import { fileBuffers } from './buffers.js';
import { readClips } from './clips.js';
import type { Container } from './container.js';
import { nodeTree } from './node-tree.js';
import { type Problem, problem } from './problem.js';
import { type Problems, problemList } from './problem-list.js';
import { writePlan } from './write-plan.js';

/** Reads a glTF asset that has been taken apart into tracks. */
export async function gltfFile(container: Container, options: OpenOptions): Promise<AnimationFile> {
  const problems = problemList(container);
  checkVersion(container, problems);
  checkLength(container, problems);
  const nodes = nodeTree(container, problems);
  const buffers = fileBuffers(container, options.sibling);
  const paths = nodes.map(({ path }) => path);
  const { clips, tracks } = await readClips(container, paths, buffers, problems);
  const found = problems.all();
  refuseHidden(found);
  return Object.freeze({
    format: container.format,
    fixedTimes: false,
    nodes: Object.freeze(nodes),
    clips: Object.freeze(clips),
    problems: Object.freeze(found),
    plan: async (
      changed: readonly RotationTrack[],
      followers?: readonly Follower[],
      axes: readonly string[] = [],
    ) => {
      if (axes.length > 0) throw fixedAxes(container.file);
      return writePlan(container, buffers, tracks, changed, followers);
    },
  });
}

function fixedAxes(file: string): SlewcurveError {
  return new SlewcurveError(
    'gltf.fixed-axes',
    `${file}: glTF has one set of axes, right-handed with y up, and its nodes, meshes and skins would stay in them while the rotations turn. Turn its root instead, or restate the file that it was made from.`,
    { file },
  );
}

function checkVersion(container: Container, problems: Problems): void {
  const version = textMember(member(container.json, 'asset'), 'version');
  const pointer = '/asset/version';
  if (version === undefined)
    problems.push(
      problem(container, 'gltf.no-version', pointer, 'is missing; the file is read as glTF 2.0.', {}, 'note'),
    );
  else if (!/^2\.\d+$/.test(version))
    throw new SlewcurveError(
      'gltf.version',
      `${container.file}: ${pointer} is ${shown(version)}; glTF 2.0 is read. Export the file again as glTF 2.0.`,
      { file: container.file, pointer },
    );
}

function checkLength({ source, file, declaredLength }: Container, problems: Problems): void {
  if (declaredLength !== undefined && declaredLength < source.size)
    problems.push({
      code: 'gltf.trailing-bytes',
      level: 'note',
      message: `${file}: the header says ${declaredLength} bytes; the file has ${source.size}. What follows is left alone.`,
      place: { file, byte: declaredLength },
    });
}

/**
 * A file that hides rotations behind a required extension is not read in part: it says by which.
 *
 * @throws SlewcurveError `gltf.needs-extension`
 */
function refuseHidden(problems: readonly Problem[]): void {
  const hidden = problems.find(({ code }) => code === 'gltf.needs-extension');
  if (hidden) throw new SlewcurveError(hidden.code, hidden.message, hidden.place);
}
