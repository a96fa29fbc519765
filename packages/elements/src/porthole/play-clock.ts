/** Speeds of playing, against the clock on the wall. */
export const PLAY_SPEEDS: readonly number[] = [0.05, 0.1, 0.25, 0.5, 1, 2, 4];

/** The moment after `elapsed` seconds on the wall: goes round where `loops`, else stops at the end. */
export function playOn(
  time: number,
  elapsed: number,
  speed: number,
  span: readonly [number, number],
  loops: boolean,
): { readonly time: number; readonly ended: boolean } {
  const next = time + elapsed * speed;
  if (next < span[1]) return { time: Math.max(span[0], next), ended: false };
  const length = span[1] - span[0];
  if (!loops || !(length > 0)) return { time: span[1], ended: true };
  return { time: span[0] + ((next - span[0]) % length), ended: false };
}
