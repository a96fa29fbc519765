import type { Interpolation } from '@slewcurve/core';
import { type Json, countMember, isObject, listMember, member, shown, textMember } from '../json-value.js';
import { AccessorFault } from './accessor-layout.js';
import type { Container } from './container.js';
import { requiredExtension } from './required-extension.js';

/** A channel that turns a node, with its indices checked to exist (accessors are checked when they are read). */
export interface RotationChannel {
  readonly clipIndex: number;
  readonly channel: number;
  readonly sampler: number;
  readonly node: number;
  readonly input: number;
  readonly output: number;
  readonly interpolation: Exclude<Interpolation, 'EULER'>;
}

export function channelPointer(clipIndex: number, channel: number): string {
  return `/animations/${clipIndex}/channels/${channel}`;
}

export function samplerPointer(clipIndex: number, sampler: number): string {
  return `/animations/${clipIndex}/samplers/${sampler}`;
}

/**
 * The channel if it turns a node; undefined where it moves something else.
 *
 * @throws AccessorFault `gltf.bad-channel`, `gltf.bad-target`, `gltf.no-node`, `gltf.no-sampler`, `gltf.bad-interpolation`,
 * `gltf.no-accessor`, `gltf.needs-extension`
 */
export function rotationChannel(
  container: Container,
  clipIndex: number,
  channel: number,
): RotationChannel | undefined {
  const pointer = channelPointer(clipIndex, channel);
  const clip = listMember(container.json, 'animations')[clipIndex];
  const json = listMember(clip, 'channels')[channel];
  if (!isObject(json))
    throw fault(container, 'gltf.bad-channel', pointer, `must be an object; it is ${shown(json)}.`);
  const target = member(json, 'target');
  if (!isObject(target))
    throw fault(
      container,
      'gltf.bad-target',
      `${pointer}/target`,
      `must be an object; it is ${shown(target)}.`,
    );
  const node = rotatedNode(container, target, `${pointer}/target`);
  if (node === undefined) return undefined;
  const nodes = listMember(container.json, 'nodes');
  if (!isObject(nodes[node]))
    throw fault(
      container,
      'gltf.no-node',
      `${pointer}/target`,
      `names node ${node}, which is none; there are ${nodes.length}.`,
    );
  const samplers = listMember(clip, 'samplers');
  const sampler = countMember(json, 'sampler');
  const found = sampler === undefined ? undefined : samplers[sampler];
  if (sampler === undefined || !isObject(found))
    throw fault(
      container,
      'gltf.no-sampler',
      `${pointer}/sampler`,
      `is ${shown(member(json, 'sampler'))}; the clip has ${samplers.length} samplers.`,
    );
  for (const [part, at] of [
    [clip, `/animations/${clipIndex}`],
    [json, pointer],
    [found, samplerPointer(clipIndex, sampler)],
  ] as const) {
    const name = requiredExtension(container.json, part);
    if (name !== undefined)
      throw fault(
        container,
        'gltf.needs-extension',
        at,
        `is played by ${name}, which the file requires and which is not read. Export it without that extension.`,
      );
  }
  return {
    clipIndex,
    channel,
    sampler,
    node,
    ...samplerParts(container, found, samplerPointer(clipIndex, sampler)),
  };
}

type SamplerParts = Pick<RotationChannel, 'input' | 'output' | 'interpolation'>;

function samplerParts(container: Container, sampler: Json, pointer: string): SamplerParts {
  const stated = member(sampler, 'interpolation');
  const interpolation = stated === undefined ? 'LINEAR' : stated;
  if (interpolation !== 'STEP' && interpolation !== 'LINEAR' && interpolation !== 'CUBICSPLINE')
    throw fault(
      container,
      'gltf.bad-interpolation',
      `${pointer}/interpolation`,
      `is ${shown(interpolation)}; glTF 2.0 knows STEP, LINEAR and CUBICSPLINE.`,
    );
  const input = countMember(sampler, 'input');
  const output = countMember(sampler, 'output');
  if (input === undefined || output === undefined)
    throw fault(
      container,
      'gltf.no-accessor',
      pointer,
      `needs an input and an output; it has ${shown(member(sampler, 'input'))} and ${shown(member(sampler, 'output'))}.`,
    );
  return { input, output, interpolation };
}

/** Lets a channel name what it moves by a JSON pointer (Khronos, ratified). */
export const POINTER_EXTENSION = 'KHR_animation_pointer';

/** Number of the node that the target turns; -1 where it names none that can be; undefined where it turns nothing. */
function rotatedNode(container: Container, target: Json, pointer: string): number | undefined {
  const path = textMember(target, 'path');
  if (path === undefined)
    throw fault(
      container,
      'gltf.bad-target',
      `${pointer}/path`,
      `must be text; it is ${shown(member(target, 'path'))}.`,
    );
  const extension = member(member(target, 'extensions'), POINTER_EXTENSION);
  const aimed = textMember(extension, 'pointer');
  const turned = /^\/nodes\/(0|[1-9][0-9]{0,9})\/rotation$/.exec(aimed ?? '')?.[1];
  if (path === 'pointer') {
    // RFC 6901: a pointer is empty or begins with a slash. What is none may have meant a rotation.
    if (!/^(?:\/|$)/.test(aimed ?? '?'))
      throw fault(
        container,
        'gltf.bad-target',
        `${pointer}/extensions/${POINTER_EXTENSION}/pointer`,
        `must be a JSON pointer such as "/nodes/0/rotation"; it is ${shown(member(extension, 'pointer'))}.`,
      );
    return turned === undefined ? undefined : Number(turned);
  }
  if (turned !== undefined)
    throw fault(
      container,
      'gltf.bad-target',
      `${pointer}/path`,
      `must be "pointer" beside a ${POINTER_EXTENSION}; it is ${shown(path)}.`,
    );
  if (path !== 'rotation') return undefined;
  const node = member(target, 'node');
  // Without a node the target is left to an extension (glTF 2.0, "animation.channel.target"): nothing of ours.
  if (node === undefined) return undefined;
  return countMember(target, 'node') ?? -1;
}

/** Number of the node of which the target moves something; -1 where it is none's. */
export function movedNode(target: Json | undefined): number {
  if (textMember(target, 'path') !== 'pointer') return countMember(target, 'node') ?? -1;
  const aimed = textMember(member(member(target, 'extensions'), POINTER_EXTENSION), 'pointer');
  return Number(/^\/nodes\/(\d{1,10})\//.exec(aimed ?? '')?.[1] ?? -1);
}

function fault(container: Container, code: string, pointer: string, what: string): AccessorFault {
  return new AccessorFault(code, `${container.file}: ${pointer} ${what}`, { file: container.file, pointer });
}
