import { playAs, type Curve, type PlaybackId, type RotationTrack } from '@slewcurve/core';

const DEGREES = 180 / Math.PI;
const [WIDTH, HEIGHT, FOOT] = [224, 64, 12];
/** Seconds on either side. */
const REACH = 0.5;
const COLUMNS = 112;

/**
 * The angular speed of a track for half a second on either side of a time, as SVG: the greatest in each column, so that no one-frame pop
 * is lost; a post at each key, the time itself hatched through.
 */
export function tracePicture(track: RotationTrack, playback: PlaybackId, time: number): string | undefined {
  const curve = playAs(track, playback);
  const from = Math.max(curve.start, time - REACH);
  const to = Math.min(curve.end, time + REACH);
  if (!(to > from)) return undefined;
  const speeds = speedsOf(curve, from, to);
  const most = Math.max(...speeds, 1e-9);
  const x = (t: number): string => ((WIDTH * (t - from)) / (to - from)).toFixed(1);
  const base = HEIGHT - FOOT;
  const points = speeds.map(
    (speed, i) =>
      `${((WIDTH * (i + 0.5)) / COLUMNS).toFixed(1)},${(base - (base - 4) * (speed / most)).toFixed(1)}`,
  );
  const keys = Array.from(track.times).filter((t) => t >= from && t <= to);
  // More posts than there is room for are a grey bar that tells nothing.
  const posts = keys.length > COLUMNS ? '' : keys.map((t) => `M${x(t)} ${base}v4`).join('');
  return [
    `<svg viewBox="0 0 ${WIDTH} ${HEIGHT}" role="img" aria-label="Angular speed from ${from.toFixed(3)} s to ${to.toFixed(3)} s, at most ${most.toFixed(1)} degrees per second">`,
    `<path d="M0 ${base}H${WIDTH}${posts}" stroke="#222" fill="none"/>`,
    `<path d="M${x(time)} 0V${base}" stroke="#222" stroke-dasharray="2 3" fill="none"/>`,
    `<polyline points="${points.join(' ')}" stroke="#46586b" stroke-width="1.5" fill="none"/>`,
    `<text x="0" y="${HEIGHT - 1}" font-size="8" fill="#222">${from.toFixed(2)} s</text>`,
    `<text x="${WIDTH}" y="${HEIGHT - 1}" font-size="8" text-anchor="end" fill="#222">${to.toFixed(2)} s, at most ${most.toFixed(0)} deg/s</text>`,
    '</svg>',
  ].join('');
}

function speedsOf(curve: Curve, from: number, to: number): number[] {
  return Array.from({ length: COLUMNS }, (_, i) => {
    const start = from + ((to - from) * i) / COLUMNS;
    return curve.peak(start, from + ((to - from) * (i + 1)) / COLUMNS).rate * DEGREES;
  });
}
