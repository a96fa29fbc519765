/** Whether a stored number can be a time: finite, and small enough (1e300 s) for differences to stay finite; see `playableTrack`. */
export function isTime(time: number | undefined): time is number {
  return time !== undefined && Math.abs(time) <= 1e300;
}
