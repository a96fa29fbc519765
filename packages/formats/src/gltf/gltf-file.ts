import { SlewcurveError } from '@slewcurve/core';
import type { AnimationFile, OpenOptions } from '../animation-file.js';
import { isObject, listMember, member, shown, textMember } from '../json-value.js';
import { COMPRESSIONS } from './accessor-layout.js';
import { fileBuffers } from './buffers.js';
import { readClips } from './clips.js';
import type { Container } from './container.js';
import { nodeTree } from './node-tree.js';
import { type Problem, problem } from './problem.js';

/** Reads a glTF asset that has been taken apart into tracks. */
export async function gltfFile(container: Container, options: OpenOptions): Promise<AnimationFile> {
  const problems: Problem[] = [];
  checkVersion(container, problems);
  checkLength(container, problems);
  const nodes = nodeTree(container, problems);
  const buffers = fileBuffers(container, options.sibling);
  const paths = nodes.map(({ path }) => path);
  const clips = await readClips(container, paths, buffers, problems);
  refuseHidden(
    container,
    clips.some(({ tracks }) => tracks.length > 0),
    problems,
  );
  return Object.freeze({
    format: container.format,
    nodes: Object.freeze(nodes),
    clips: Object.freeze(clips),
    problems: Object.freeze(problems),
    plan: async () => {
      throw new SlewcurveError('plan.cannot-write', 'Writing is not built yet.');
    },
  });
}

function checkVersion(container: Container, problems: Problem[]): void {
  const version = textMember(member(container.json, 'asset'), 'version');
  const pointer = '/asset/version';
  if (version === undefined)
    problems.push(
      problem(container, 'gltf.no-version', pointer, 'is missing; the file is read as glTF 2.0.'),
    );
  else if (!/^2\.\d+$/.test(version))
    throw new SlewcurveError(
      'gltf.version',
      `${container.file}: ${pointer} is ${shown(version)}; glTF 2.0 is read. Export the file again as glTF 2.0.`,
      { file: container.file, pointer },
    );
}

function checkLength({ source, file, declaredLength }: Container, problems: Problem[]): void {
  if (declaredLength !== undefined && declaredLength < source.size)
    problems.push({
      code: 'gltf.trailing-bytes',
      message: `${file}: the header says ${declaredLength} bytes; the file has ${source.size}. What follows is left alone.`,
      place: { file, byte: declaredLength },
    });
}

/**
 * A file whose rotations are all hidden by a required extension can't be read, and says by which.
 *
 * @throws SlewcurveError `gltf.needs-extension`
 */
function refuseHidden(container: Container, anyTrack: boolean, problems: readonly Problem[]): void {
  if (anyTrack) return;
  const required = listMember(container.json, 'extensionsRequired').filter(
    (name): name is string => typeof name === 'string',
  );
  const buffers = listMember(container.json, 'buffers');
  const hiding = required.filter(
    (name) =>
      COMPRESSIONS.includes(name) &&
      (problems.some(({ code }) => code === 'gltf.needs-extension') ||
        buffers.some((buffer) => isObject(member(member(buffer, 'extensions'), name)))),
  );
  if (hiding.length > 0)
    throw new SlewcurveError(
      'gltf.needs-extension',
      `${container.file}: the data is compressed with ${hiding.join(' and ')}, which the file requires and which is not read. Export it without that compression.`,
      { file: container.file, pointer: '/extensionsRequired' },
    );
}
