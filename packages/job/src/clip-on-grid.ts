import type { Clip } from '@slewcurve/core';

/** A clip on the frame rate that people say it has; as it was found where they say nothing. */
export function clipOnGrid(clip: Clip, frameRate: number | undefined): Clip {
  return frameRate === undefined ? clip : { ...clip, frameRate };
}
