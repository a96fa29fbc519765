import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { segmentsOf } from '../../segments.js';

/** Share by which a measured spin may differ from the declared one. */
const CLOSE = 0.02;

/** A spin whose keys are too far apart to tell its way. */
export const lost: Rule = Object.freeze({
  id: 'turn.lost',
  family: 'turn',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['spinning', 'wagon wheel', 'aliasing', 'lost turns', 'backwards spin', 'rpm', 'wheel'],
  summary: 'A thing that is declared to spin turns too far between keys, or not as fast as declared.',
  limits: everyRole({ step: 120.01 }),
  reads: 'track',
  untouched: 'both ends of the spin',
  find(context: TrackContext, { step: limit = 0 }: Limits): readonly Place[] {
    const [rpm] = context.declared.spins;
    const { times } = context.track;
    if (rpm === undefined || times.length < 2 || context.played.every(({ holds }) => holds)) return [];
    const { turns } = segmentsOf(context);
    const wide: Place[] = [];
    for (const [k, value] of turns.entries()) {
      if (!(value > limit)) continue;
      const span = [times[k] ?? 0, times[k + 1] ?? 0] as const;
      wide.push({ keys: [k + 1], time: span[1], span, value, limit, level: 'warning' });
    }
    return wide.length > 0 ? wide : offSpeed(context, rpm);
  },
  // `whole turns` needs to be told how many; that is a person's to say.
  remedy: (): Remedy | undefined => undefined,
  message({ keys: [key = 0], value, limit, facts }: Place): string {
    if (facts?.['rpm'] !== undefined)
      return `it turns ${sayDegrees(value)} a key where ${facts['rpm']} turns a minute, as declared, are ${sayDegrees(limit)}: turns are lost between keys, or the declaration is wrong`;
    return `from key ${key - 1} to key ${key} a declared spin turns ${sayDegrees(value)} (limit ${sayDegrees(limit)}): its way round hangs on a hair`;
  },
  page: {
    what: 'Wheels, propellers, turntables keyed too rarely: 240° forward is 120° back to every program that goes the short way.',
    trace: 'A spin that runs slow, backwards, or by turns one and the other.',
    standard: 'glTF 2.0 has LINEAR rotations go the shorter way: more than half a turn a key can’t be told.',
    programs: 'All go the short way of each step.',
    people: 'A wheel that turns backwards. On a motor, a reversal at full speed.',
    test: 'In a track that the house rules declare to spin, a step of more than 120.01°; or, where there is none, a mean turn a key that differs by more than 2 % from what the declared turns a minute give.',
    source:
      '120° keeps a margin of 60° to the half turn, and a third of a turn is what three keys a turn give: common practice, no source. 1,200 turns a minute at 30 keys a second are 240° a key, seen as −120° (arithmetic).',
    spares: 'Everything that is not declared to spin; STEP tracks.',
    remedy:
      '`whole turns` lays keys close enough along as many turns as are meant; how many that are only a person can say.',
  },
});

function offSpeed(context: TrackContext, rpm: number): readonly Place[] {
  const { track } = context;
  const { turns } = segmentsOf(context);
  const [start, end] = [track.times[0] ?? 0, track.times.at(-1) ?? 0];
  const declared = (6 * Math.abs(rpm) * (end - start)) / turns.length;
  const value = turns.reduce((sum, turn) => sum + (Number.isNaN(turn) ? 0 : turn), 0) / turns.length;
  if (!(Math.abs(value - declared) > CLOSE * declared)) return [];
  const last = turns.length;
  const facts = { rpm };
  return [{ keys: [last], time: end, span: [start, end], value, limit: declared, level: 'warning', facts }];
}
