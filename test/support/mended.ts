import type { RotationTrack } from '@slewcurve/core';
import { type AnimationFile, bufferSource, patchedBytes } from '@slewcurve/formats';
import { type JobSettings, type MendedFile, mendFile, openFile, surveyFile } from '@slewcurve/job';
import type { Step } from '@slewcurve/mend';
import { NO_HOUSE_RULES } from '@slewcurve/survey';
import { expect } from 'vitest';

/** As the command has them where nothing is said. */
export const SETTINGS: JobSettings = {
  playbacks: ['as-written'],
  failAt: 'warning',
  allowWarnings: 0,
  houseRules: NO_HOUSE_RULES,
};

/** A mended file, read back from its bytes. */
export type Made = MendedFile & { bytes: Uint8Array; file: AnimationFile };

/** Runs steps on a file as the command does; undo restores its very bytes. */
export const mend = (bytes: Uint8Array, ...steps: Step[]): Promise<Made> => mendBy(SETTINGS, bytes, ...steps);

/** The same under given settings. */
export async function mendBy(settings: JobSettings, bytes: Uint8Array, ...steps: Step[]): Promise<Made> {
  const options = { name: 'flight.glb' };
  const opened = await openFile(bufferSource(bytes), options);
  const before = await surveyFile(options.name, opened.file, settings);
  const mended = await mendFile(opened, { schemaVersion: 1, steps }, before, settings, options);
  const made = await mended.result.read(0, mended.result.size);
  // Undo restores the very bytes.
  expect(Buffer.compare(patchedBytes(made, mended.undo), bytes)).toBe(0);
  const { file } = await openFile(bufferSource(made), options);
  return { ...mended, bytes: made, file };
}

/** The track of a clip; the only one where none is named. */
export function trackOf(file: AnimationFile, clip: string, id?: string): RotationTrack {
  const track = file.clips
    .find(({ name }) => name === clip)
    ?.tracks.find((other) => id === undefined || other.id === id);
  if (!track) throw new Error(`${clip} is not there`);
  return track;
}
