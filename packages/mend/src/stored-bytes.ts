import type { RotationTrack } from '@slewcurve/core';

/** Bytes of one number by storage; text counts as eight letters. */
const BYTES = { float64: 8, float32: 4, int16: 2, uint16: 2, int8: 1, uint8: 1, text: 8 } as const;

/** Bytes that a track's times and values take in its own storage. */
export function storedBytes({ times, values, storage }: RotationTrack): number {
  return times.length * BYTES[storage.timeComponent] + values.length * BYTES[storage.component];
}
