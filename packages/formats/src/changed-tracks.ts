import { type RotationTrack, SlewcurveError } from '@slewcurve/core';

/**
 * Each changed track with what was read under its clip and id, in the order of `changed`.
 *
 * @throws SlewcurveError `plan.unknown-track`, `plan.doubled-track`
 */
export function pairTracks<Read extends { readonly track: RotationTrack }>(
  file: string,
  tracks: readonly Read[],
  changed: readonly RotationTrack[],
): { readonly read: Read; readonly track: RotationTrack }[] {
  const known = new Map(tracks.map((read) => [keyOf(read.track), read]));
  const seen = new Set<string>();
  return changed.map((track) => {
    const place = { file, clip: track.clip, track: track.id };
    const read = known.get(keyOf(track));
    if (!read)
      throw new SlewcurveError(
        'plan.unknown-track',
        `${file} has no rotation track ${track.id} in ${track.clip}.`,
        place,
      );
    if (seen.has(keyOf(track)))
      throw new SlewcurveError(
        'plan.doubled-track',
        `${track.id} in ${track.clip} is given twice; give each track once.`,
        place,
      );
    seen.add(keyOf(track));
    return { read, track };
  });
}

function keyOf({ clip, id }: RotationTrack): string {
  return JSON.stringify([clip, id]);
}
