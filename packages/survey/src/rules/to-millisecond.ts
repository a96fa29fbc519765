/** A span rounded outwards to milliseconds, for edits to which one key more is nothing: steps are sentences that people read. */
export function toMillisecond([from, to]: readonly [number, number]): readonly [number, number] {
  return [Math.floor(from * 1000) / 1000, Math.ceil(to * 1000) / 1000];
}
