// What two independent readers counted in real files (../shared/data/counts.json), held against the survey's findings.
import { describe, expect, test } from 'vitest';
import { bufferSource, openAnimation, type AnimationFile } from '@slewcurve/formats';
import { surveyClip, type Finding } from '@slewcurve/survey';
import { sharedFile } from '../support/shared-data.js';

interface Counted {
  readonly total?: { readonly flips: number; readonly spans_over_170: number; readonly bad_times: number };
  readonly channels?: readonly {
    readonly clip: number | string;
    readonly node: number | string;
    readonly flip_at?: readonly number[];
  }[];
  /** BVH. */
  readonly joint?: Readonly<
    Record<
      string,
      { readonly max_span_deg: number; readonly max_span_frame: number; readonly spans_over_170: number }
    >
  >;
  /** Trajectories. */
  readonly flip_at?: readonly number[];
  readonly euler_jump_at?: readonly number[];
  readonly missing_samples?: number;
  readonly missing_runs?: number;
  readonly gaps_over_2_5x?: number;
  readonly non_increasing_at?: readonly number[];
  readonly samples_with_abs_x_over_85?: number;
}

const TABLES = {
  'head-and-hand': { euler: 'YXZ' },
  fr2_desk: { columns: 'timestamp,tx,ty,tz,qx,qy,qz,qw'.split(',') },
};

const counts = sharedFile('data/counts.json');
const counted: [string, Counted][] = counts.absent
  ? []
  : Object.entries(JSON.parse(new TextDecoder().decode(counts.read())).files);
const inFolder = (folder: string): [string, Counted][] =>
  counted.filter(([name]) => name.startsWith(folder) && !name.includes('splines-single-or-no'));

async function open(name: string): Promise<AnimationFile> {
  const shared = sharedFile(`data/${name}`);
  const [, table] = Object.entries(TABLES).find(([part]) => name.includes(part)) ?? [];
  const beside = (uri: string) => sharedFile(`data/${name.replace(/[^/]*$/, '')}${uri}`).read();
  return openAnimation(bufferSource(shared.read()), {
    name,
    sibling: async (uri) => bufferSource(beside(uri)),
    ...(table && { table }),
  });
}

async function findingsOf(name: string): Promise<{ file: AnimationFile; findings: Finding[] }> {
  const file = await open(name);
  return { file, findings: file.clips.flatMap((clip) => surveyClip(clip, file.nodes)) };
}

/** Keys that findings of some rules name, ascending, each once. */
function keysOf(findings: readonly Finding[], ...rules: readonly string[]): number[] {
  const keys = findings
    .filter(({ rule }) => rules.includes(rule))
    .flatMap(({ occurrences }) => occurrences.flatMap((place) => place.keys));
  return [...new Set(keys)].toSorted((a, b) => a - b);
}

describe.skipIf(counts.absent)('the survey finds what was counted', () => {
  test.each(inFolder('gltf/'))(
    '%s: every change of sign, half turn and bad time',
    async (name, { total, channels = [] }) => {
      const { file, findings } = await findingsOf(name);
      for (const { clip, node, flip_at: flips = [] } of channels) {
        const named = file.clips.find((each) => each.name === clip || each.index === clip);
        const track = named?.tracks.find(
          ({ source }) => source.node === node || file.nodes[source.node]?.name === node,
        );
        const own = findings.filter((one) => one.clip === named?.name && one.track === track?.id);
        const told = keysOf(own, 'turn.sign-flip', 'turn.half');
        // Within 6° of half a turn it is the half turn that tells of the sign.
        expect(flips.filter((key) => !told.includes(key))).toEqual([]);
        expect(keysOf(own, 'turn.sign-flip').filter((key) => !flips.includes(key))).toEqual([]);
      }
      const wide = findings.filter(({ rule, level }) => rule === 'turn.half' && level === 'error');
      expect(wide.reduce((sum, { count }) => sum + count, 0)).toBe(total?.spans_over_170);
      const times = findings.filter(({ rule }) => rule === 'file.time-order');
      expect(times.reduce((sum, { count }) => sum + count, 0)).toBe(total?.bad_times);
    },
  );

  test.each(inFolder('bvh/'))(
    '%s: every rest pose on its first frame, no half turn',
    async (name, { joint = {} }) => {
      const { findings } = await findingsOf(name);
      const told = findings
        .filter(({ rule }) => rule === 'jump.first-key')
        .map(({ track }) => track.slice(track.lastIndexOf('/') + 1));
      const poses = Object.entries(joint)
        // The rule asks for 20° and more, in one step.
        .filter(([, { max_span_deg: most, max_span_frame: at }]) => most > 20 && at === 1)
        .map(([id]) => id);
      expect(told.toSorted()).toEqual(poses.toSorted());
      expect(findings.filter(({ rule }) => rule === 'turn.half')).toHaveLength(
        Object.values(joint).filter(({ spans_over_170: wide }) => wide > 0).length,
      );
    },
  );

  test.each(inFolder('trajectories/'))(
    '%s: every change of sign, wrap, pole, lost sample and bad time',
    async (name, count) => {
      const { file, findings } = await findingsOf(name);
      const isAngles = file.clips[0]?.tracks[0]?.interpolation === 'EULER';
      expect(keysOf(findings, 'turn.sign-flip')).toEqual(isAngles ? [] : count.flip_at);
      const poles = count.samples_with_abs_x_over_85 ?? 0;
      const steps = keysOf(findings, 'turn.wrap', 'turn.euler-flip', 'turn.gimbal');
      const jumps = count.euler_jump_at ?? [];
      expect(jumps.filter((key) => !steps.includes(key))).toEqual([]);
      // Beside the jumps there is a pole passage for each sample that comes near one, of a key or two, and nothing else.
      const passages = steps.filter((key) => !jumps.includes(key));
      expect(passages.length).toBeGreaterThanOrEqual(poles);
      expect(passages.length).toBeLessThanOrEqual(2 * poles);
      const holes = findings.filter(({ rule }) => rule === 'file.hole');
      expect(holes.reduce((sum, { count: places }) => sum + places, 0)).toBe(
        (count.missing_runs ?? 0) + (count.gaps_over_2_5x ?? 0),
      );
      expect(keysOf(findings, 'file.time-order')).toEqual(count.non_increasing_at);
    },
  );
});
