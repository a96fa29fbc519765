import type { Finding, Level } from './finding.js';

/** What happens on several tracks of a clip within one frame: one event, not a finding each. */
export interface SurveyEvent {
  readonly clip: string;
  /** Of its rules: `jump`, `seam`, …. */
  readonly family: string;
  /** Seconds: of the first place; the others lie within one frame after it. */
  readonly time: number;
  /** The worst of its places. */
  readonly level: Level;
  /** The track that stands nearest to the root: where to look first. */
  readonly owner: string;
  /** How many tracks it is on, and which of their rules. */
  readonly tracks: number;
  readonly places: readonly { readonly track: string; readonly rule: string }[];
}

/** Findings whose owners are known, and what of them happens at once. */
export interface Gathered<F extends Finding> {
  readonly findings: readonly F[];
  readonly events: readonly SurveyEvent[];
}

/** The frame of a clip that lies on no grid, seconds. */
const USUAL_FRAME = 1 / 30;
/** Times that were rounded may put a frame a little past the next. */
const SLACK = 1.01;
const SEVERITY: readonly Level[] = ['note', 'warning', 'error'];

/**
 * Places of several tracks of a clip, in one family of rules, within one frame of the first: one event. The owner of an event is the
 * track nearest to the root; a jump that stands in an event on a track whose ancestor jumps as well belongs to the highest such ancestor.
 * Places of no key (of a whole track) and those of family `file` make no event: what is stored wrongly happens at no time.
 *
 * @param frameRates of clips that lie on a grid, frames a second, by name
 */
export function gatherEvents<F extends Finding>(
  findings: readonly F[],
  frameRates: ReadonlyMap<string, number> = new Map(),
): Gathered<F> {
  const groups = new Map<string, Spot[]>();
  for (const finding of findings) {
    const family = familyOf(finding.rule);
    if (family === 'file') continue;
    const key = `${family}\u001F${finding.clip}`;
    const spots = groups.get(key) ?? [];
    groups.set(key, spots);
    for (const { keys, time, level } of finding.occurrences)
      if (keys.length > 0) spots.push({ finding, time, level });
  }
  const owners = new Map<Finding, string>();
  const events = [...groups.values()].flatMap((spots) => {
    const [first] = spots;
    if (first === undefined) return [];
    const frame = SLACK / (frameRates.get(first.finding.clip) ?? 1 / USUAL_FRAME);
    return bunches(spots, frame).map((bunch) => eventOf(bunch, owners));
  });
  events.sort((a, b) => compare(a.clip, b.clip) || a.time - b.time || compare(a.family, b.family));
  return {
    findings: findings.map((finding) => {
      const owner = owners.get(finding);
      return owner === undefined ? finding : { ...finding, owner };
    }),
    events,
  };
}

/**
 * The event that a place of a finding is part of; undefined where it stands alone.
 *
 * @param time of the place, seconds
 * @param frameRate of the clip, where it lies on a grid
 */
export function eventAt(
  events: readonly SurveyEvent[],
  { rule, clip, track }: Pick<Finding, 'rule' | 'clip' | 'track'>,
  time: number,
  frameRate?: number,
): SurveyEvent | undefined {
  const frame = SLACK / (frameRate ?? 1 / USUAL_FRAME);
  return events.find(
    (event) =>
      event.clip === clip &&
      event.family === familyOf(rule) &&
      time >= event.time &&
      time - event.time <= frame &&
      event.places.some((place) => place.track === track && place.rule === rule),
  );
}

/** One place of one finding. */
interface Spot {
  readonly finding: Finding;
  readonly time: number;
  readonly level: Level;
}

/** Places by time, cut where one lies over a frame past the first of its bunch; those on one track alone are left out. */
function bunches(spots: readonly Spot[], frame: number): Spot[][] {
  const found: Spot[][] = [];
  let bunch: Spot[] = [];
  for (const spot of spots.toSorted((a, b) => a.time - b.time)) {
    if (bunch.length > 0 && spot.time - (bunch[0]?.time ?? 0) > frame) {
      found.push(bunch);
      bunch = [];
    }
    bunch.push(spot);
  }
  found.push(bunch);
  return found.filter((one) => new Set(one.map(({ finding }) => finding.track)).size > 1);
}

function eventOf(bunch: readonly Spot[], owners: Map<Finding, string>): SurveyEvent {
  const [first] = bunch;
  const tracks = [...new Set(bunch.map(({ finding }) => finding.track))];
  const family = familyOf(first!.finding.rule);
  const level = bunch.reduce((worst, spot) => Math.max(worst, SEVERITY.indexOf(spot.level)), 0);
  if (family === 'jump')
    for (const { finding, time } of bunch)
      if (time === finding.time) owners.set(finding, highest(finding.track, tracks));
  let owner = tracks[0] ?? '';
  let least = depth(owner);
  for (const track of tracks) {
    const own = depth(track);
    if (own < least) [owner, least] = [track, own];
  }
  const places = new Map(
    bunch.map(({ finding: { track, rule } }) => [`${track}\u001F${rule}`, { track, rule }]),
  );
  return {
    clip: first!.finding.clip,
    family,
    time: first!.time,
    level: SEVERITY[level] ?? 'note',
    owner,
    tracks: tracks.length,
    places: [...places.values()],
  };
}

/** The highest of some tracks that is this one or an ancestor of it: names stand `/`-separated from the root. */
function highest(track: string, tracks: readonly string[]): string {
  return tracks
    .filter((other) => track.startsWith(`${other}/`))
    .reduce((best, other) => (other.length < best.length ? other : best), track);
}

function depth(track: string): number {
  return track.split('/').length;
}

/** Ids are `family.slug`. */
function familyOf(rule: string): string {
  return rule.slice(0, rule.indexOf('.'));
}

function compare(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
