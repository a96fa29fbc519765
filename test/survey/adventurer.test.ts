import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { playAs, type RotationTrack, type SceneNode } from '@slewcurve/core';
import { bufferSource, openAnimation } from '@slewcurve/formats';
import { verbNamed } from '@slewcurve/mend';
import { surveyTrack, type Finding } from '@slewcurve/survey';
import { measured } from '../support/measured.js';
import { sharedFile } from '../support/shared-data.js';

const DEGREES = 180 / Math.PI;
const adventurer = sharedFile('data/gltf/animation-only/adventurer-9clips.glb');
const cube = sharedFile('data/gltf/animation-only/spinning-cube.glb');

interface Surveyed {
  readonly nodes: readonly SceneNode[];
  readonly tracks: readonly { readonly track: RotationTrack; readonly findings: readonly Finding[] }[];
}

async function surveyed(shared: typeof adventurer): Promise<Surveyed> {
  if (shared.absent) return { nodes: [], tracks: [] };
  const file = await openAnimation(bufferSource(shared.read()), { name: shared.path });
  const tracks = file.clips.flatMap((clip) =>
    clip.tracks.map((track) => ({ track, findings: surveyTrack(track, { clip, nodes: file.nodes }) })),
  );
  return { nodes: file.nodes, tracks };
}

/** The track after every remedy of its jumps, each place by its own step. */
function mended(track: RotationTrack, findings: readonly Finding[]): RotationTrack {
  return findings
    .filter((finding) => finding.rule.startsWith('jump.'))
    .flatMap((finding) => finding.occurrences)
    .reduce(
      (after, { remedy }) =>
        remedy === undefined ? after : verbNamed(remedy.verb).apply(after, remedy).track,
      track,
    );
}

function keyed(findings: readonly Finding[]): string[] {
  return findings
    .filter((finding) => finding.level !== 'note')
    .flatMap((finding) => finding.occurrences.map((place) => `${finding.rule} ${place.keys.join()}`));
}

// Character animation pack by Kay Lousberg (CC0), nine clips of one skeleton at 30 frames a second.
describe.skipIf(adventurer.absent)('adventurer-9clips.glb', async () => {
  const { nodes, tracks } = await surveyed(adventurer);
  const findings = tracks.flatMap((one) => one.findings);
  const chop = (joint: string) =>
    tracks.find(({ track }) => track.clip === '1H_Melee_Attack_Chop' && track.id.endsWith(`/${joint}`))!;

  test('107 sign changes stand in 38 tracks over 7 clips, all notes', () => {
    const flips = findings.filter((finding) => finding.rule === 'turn.sign-flip');
    expect(flips.reduce((sum, finding) => sum + finding.count, 0)).toBe(107);
    expect(flips).toHaveLength(38);
    expect(new Set(flips.map((finding) => finding.clip)).size).toBe(7);
    expect(new Set(flips.map((finding) => finding.level))).toEqual(new Set(['note']));
  });

  test('under a cubic through the stored numbers every one of them is an error', () => {
    const { track } = tracks.find((one) =>
      one.findings.some((finding) => finding.rule === 'turn.sign-flip'),
    )!;
    const [finding] = surveyTrack(track, { nodes, playbacks: ['as-written', 'finite-cubic'] });
    expect(finding).toMatchObject({ rule: 'turn.sign-flip', level: 'error', playback: 'finite-cubic' });
  });

  test.each([
    ['lowerleg.l', 61.8, [20, 9]],
    ['lowerleg.r', 67.4, [20]],
  ] as const)('%s of the chop has one shelf finding, the worst place at key 20', (joint, size, keys) => {
    const shelves = chop(joint).findings.filter((finding) => finding.rule === 'jump.shelf');
    expect(shelves).toHaveLength(1);
    expect(shelves[0]).toMatchObject({ level: 'warning', keys: [20], count: keys.length });
    // Named to a tenth of a degree.
    expect(Math.abs(shelves[0].value - size)).toBeLessThan(0.05);
    expect(shelves[0].occurrences.map((place) => place.keys[0])).toEqual(keys);
  });

  test('the table of verdicts lists every jump place, with its rule, size and level', () => {
    const rows = readFileSync('packages/survey/docs/adventurer-verdicts.md', 'utf8')
      .split('\n')
      .map((line) => line.split('|').map((cell) => cell.trim()))
      .filter((cells) => /^\d+$/.test(cells[3] ?? ''))
      .map(([, clip, joint, key, rule, size, , level]) =>
        [clip, joint, key, `jump.${rule.replace(' ', '-')}`, size, level].join(' '),
      );
    const places = findings
      .filter((finding) => finding.rule.startsWith('jump.'))
      .flatMap(({ clip, track, rule, occurrences }) =>
        occurrences.map(({ keys, value, level }) =>
          [clip, track.slice(track.lastIndexOf('/') + 1), keys[0], rule, value.toFixed(1), level].join(' '),
        ),
      );
    expect(rows.toSorted()).toEqual(places.toSorted());
  });

  test('at most 20 jump places stand in the whole file', () => {
    const jumps = findings.filter((finding) => finding.rule.startsWith('jump.'));
    const places = jumps.reduce((sum, finding) => sum + finding.count, 0);
    measured(`adventurer-9clips.glb: ${places} jump places in ${jumps.length} findings`);
    expect(places).toBeLessThanOrEqual(20);
  });

  test.each(['lowerleg.l', 'lowerleg.r'])(
    'the bridge proposed for %s ends the finding and its peak',
    (joint) => {
      const { track, findings: before } = chop(joint);
      const shelf = before.find((finding) => finding.rule === 'jump.shelf')!;
      expect(shelf.remedy).toMatchObject({ verb: 'bridge', keys: [20], steps: 4 });
      expect(shelf.price).toBeGreaterThan(0);
      const after = mended(track, before);
      expect(surveyTrack(after, { nodes }).filter((finding) => finding.rule.startsWith('jump.'))).toEqual([]);
      const span = [track.times[14], track.times[25]] as const;
      const peak = playAs(after, 'as-written').peak(...span).rate * DEGREES;
      measured(
        `${joint}: peak in keys 14 to 25 was ${(playAs(track, 'as-written').peak(...span).rate * DEGREES).toFixed(0)}, is ${peak.toFixed(0)} deg/s; largest key moved ${shelf.price!.toFixed(1)}°`,
      );
      expect(peak).toBeLessThanOrEqual(850);
    },
  );

  test('all jump remedies of the file together raise no warning that was not there', () => {
    for (const { track, findings: before } of tracks) {
      const known = new Set(keyed(before));
      const raised = keyed(surveyTrack(mended(track, before), { nodes })).filter(
        (place) => !known.has(place),
      );
      expect(raised, `${track.clip} ${track.id}`).toEqual([]);
    }
  });

  test('every finding tells its numbers, none of them NaN, and its fingerprints are all different', () => {
    const prints = findings.flatMap((finding) => finding.occurrences.map((place) => place.fingerprint));
    expect(new Set(prints).size).toBe(prints.length);
    expect(JSON.stringify(findings)).not.toContain('null');
  });
});

// Khronos sample model AnimatedCube, its animation alone.
describe.skipIf(cube.absent)('spinning-cube.glb', () => {
  test('both segments are half turns, each with two opposite ways', async () => {
    const { tracks } = await surveyed(cube);
    const half = tracks.flatMap((one) => one.findings).find((finding) => finding.rule === 'turn.half')!;
    expect(half).toMatchObject({ level: 'error', count: 2 });
    expect(half.occurrences.map((place) => place.keys)).toEqual(expect.arrayContaining([[1], [2]]));
    for (const { ways } of half.occurrences) {
      const [now, other] = ways!;
      expect(now.angle + other.angle).toBeCloseTo(360, 3);
      expect(now.axis.map((x) => 0 - x)).toEqual(other.axis.map((x) => 0 + x));
    }
  });
});
