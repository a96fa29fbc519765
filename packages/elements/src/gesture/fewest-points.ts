import type { Place } from './hand.js';

/**
 * Points of a line that tell it to within `most` deg/s, ends among them: the farthest one stays and both sides are asked again (U. Ramer 1972;
 * D. Douglas and T. Peucker 1973, from memory), with distance upright, as speeds are read at their time.
 */
export function fewestPoints(line: readonly Place[], most: number): readonly Place[] {
  const kept = new Set([0, line.length - 1]);
  const waiting: (readonly [number, number])[] = [[0, line.length - 1]];
  for (let next = waiting.pop(); next; next = waiting.pop()) {
    const [a, b] = next;
    let farthest = -1;
    let off = most;
    for (let i = a + 1; i < b; i++) {
      const share = (line[i].time - line[a].time) / (line[b].time - line[a].time);
      const away = Math.abs(line[i].speed - line[a].speed - share * (line[b].speed - line[a].speed));
      if (away > off) [farthest, off] = [i, away];
    }
    if (farthest < 0) continue;
    kept.add(farthest);
    waiting.push([a, farthest], [farthest, b]);
  }
  return line.filter((_, i) => kept.has(i));
}
