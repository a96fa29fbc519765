import { bufferSource, openAnimation, patchedBytes, type AnimationFile } from '@slewcurve/formats';
import type { OpenOptions } from '@slewcurve/formats';
import type { RotationTrack } from '@slewcurve/core';

/** Opens text, or bytes, under a name. */
export function openText(
  content: string | Uint8Array,
  name: string,
  options: Partial<OpenOptions> = {},
): Promise<AnimationFile> {
  return openAnimation(bufferSource(bytesOf(content)), { name, ...options });
}

/** The text that writing the given tracks into a file of text makes. */
export async function rewritten(
  content: string,
  name: string,
  tracks: readonly RotationTrack[],
  options: Partial<OpenOptions> = {},
): Promise<string> {
  const file = await openText(content, name, options);
  return Buffer.from(patchedBytes(bytesOf(content), await file.plan(tracks))).toString('latin1');
}

export function tracksOf(file: AnimationFile): readonly RotationTrack[] {
  return file.clips.flatMap(({ tracks }) => tracks);
}

function bytesOf(content: string | Uint8Array): Uint8Array {
  return typeof content === 'string' ? new TextEncoder().encode(content) : content;
}
