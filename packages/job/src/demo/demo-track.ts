/** One clip of the demo: one node's keys. */
export interface DemoTrack {
  readonly clip: string;
  /** Name of the node that turns; unique in the scene. */
  readonly node: string;
  /** Seconds. */
  readonly times: readonly number[];
  /** Unit quaternions `[x, y, z, w]`, own to parent, one a key. */
  readonly orientations: readonly Orientation[];
  readonly storage: 'float32' | 'int8';
}

export type Orientation = readonly [x: number, y: number, z: number, w: number];

/** A track with a key every `1 / rate` seconds from 0 on. */
export function bakedTrack(
  clip: string,
  node: string,
  keys: number,
  rate: number,
  orientationAt: (time: number, key: number) => Orientation,
): DemoTrack {
  const times = Array.from({ length: keys }, (_, key) => key / rate);
  return { clip, node, times, orientations: times.map(orientationAt), storage: 'float32' };
}
