// The main job on a real file (CC0, see ../shared/data/README.md), held against readers and formulas that are not ours: the glTF 2.0 text
// itself (test/support/independent-gltf.ts), the Khronos validator, glTF-Transform and three.js.
import { readFileSync, writeFileSync } from 'node:fs';
import { createHash } from 'node:crypto';
import { WebIO } from '@gltf-transform/core';
import { validateBytes, type Report as Validation } from 'gltf-validator';
import { GLTFLoader } from 'three/examples/jsm/loaders/GLTFLoader.js';
import { describe, expect, test } from 'vitest';
import type { Report } from '@slewcurve/job';
import { degreesBetween, glbChunks, rotationSamplers, sampleAt } from '../support/independent-gltf.js';
import { commandFolder, reportOf } from '../support/run-command.js';
import { sharedFile } from '../support/shared-data.js';

const adventurer = sharedFile('data/gltf/animation-only/adventurer-9clips.glb');
const cube = sharedFile('data/gltf/animation-only/spinning-cube.glb');
const CLIP = '1H_Melee_Attack_Chop';
const KNEES = ['lowerleg.l', 'lowerleg.r'];

async function inFolder(file: typeof adventurer): ReturnType<typeof commandFolder> {
  const at = await commandFolder();
  writeFileSync(at.path('in.glb'), file.read());
  return at;
}

function isKnee({ clip, track }: { readonly clip: string; readonly track: string }): boolean {
  return clip === CLIP && KNEES.some((name) => track.endsWith(name));
}

function findingsOf(report: Report): Report['files'][number]['findings'] {
  return report.files[0]?.findings ?? [];
}

describe.skipIf(adventurer.absent)('adventurer-9clips.glb', { timeout: 60_000 }, () => {
  test('has 107 sign changes in 38 tracks over 7 clips, as two independent readers counted', async () => {
    const at = await inFolder(adventurer);
    const checked = await at.run('check', 'in.glb', '--format', 'json');
    const { tracks } = reportOf(checked).files[0];
    const changed = tracks.filter((track) => track.signChanges > 0);
    expect(changed.reduce((sum, track) => sum + track.signChanges, 0)).toBe(107);
    expect(changed).toHaveLength(38);
    expect(new Set(changed.map((track) => track.clip)).size).toBe(7);
  });

  test('snaps at key 20 in both lower legs, by 61.8° and 67.4°, and has at most 20 lone keys and shelves', async () => {
    const at = await inFolder(adventurer);
    const checked = await at.run('check', 'in.glb', '--format', 'json');
    expect(checked.code).toBe(1);
    const jumps = findingsOf(reportOf(checked)).filter((finding) =>
      ['jump.lone-key', 'jump.shelf'].includes(finding.rule),
    );
    const knees = jumps.filter(
      (finding) => finding.clip === CLIP && KNEES.some((name) => finding.track.endsWith(name)),
    );
    expect(knees.map(({ rule, keys }) => [rule, keys])).toEqual([
      ['jump.shelf', [20]],
      ['jump.shelf', [20]],
    ]);
    // The message names the step between the keys; `value` is the offset that the shelf explains.
    expect(knees.map((finding) => /(6\d\.\d)°/.exec(finding.message)?.[1])).toEqual(['61.8', '67.4']);
    expect(jumps.reduce((sum, finding) => sum + finding.count, 0)).toBeLessThanOrEqual(20);
  });

  test('is mended by its proposed bridges, and nothing else changes', async () => {
    const at = await inFolder(adventurer);
    const before = reportOf(await at.run('check', 'in.glb', '--format', 'json'));
    const done = await at.run(
      'mend',
      'in.glb',
      '--proposed',
      '-o',
      'out.glb',
      '--undo-out',
      'undo.json',
      '--card-out',
      'card.json',
      '--format',
      'json',
    );
    const after = reportOf(done);
    expect(
      findingsOf(before).filter((finding) => isKnee(finding) && finding.rule === 'jump.shelf'),
    ).toHaveLength(2);
    expect(findingsOf(after).filter((finding) => isKnee(finding) && finding.level !== 'note')).toEqual([]);
    const steps = (after.steps ?? []).filter(({ step }) => isKnee(step));
    expect(steps.map(({ step }) => step.verb)).toEqual(expect.arrayContaining(['bridge', 'bridge']));
    // The price: the largest key moved, degrees.
    for (const { largest } of steps) expect(largest).toBeGreaterThan(0);

    const old = adventurer.read();
    const made = new Uint8Array(readFileSync(at.path('out.glb')));
    const spans = spansOf(after);
    const { nodes } = glbChunks(old).json;
    let outside = 0;
    let peak = 0;
    const samplers = rotationSamplers(old);
    const again = rotationSamplers(made);
    expect(again).toHaveLength(samplers.length);
    samplers.forEach((sampler, i) => {
      const span = spans.filter(({ clip, node }) => clip === sampler.clip && node === sampler.node);
      for (let key = 0; key + 1 < sampler.times.length; key++)
        for (let n = 0; n < 16; n++) {
          const t = sampler.times[key] + ((sampler.times[key + 1] - sampler.times[key]) * n) / 16;
          if (span.some(({ from, to }) => t > from && t < to)) continue;
          outside = Math.max(outside, degreesBetween(sampleAt(sampler, t, key), sampleAt(again[i], t, key)));
        }
      if (isKnee({ clip: sampler.clip, track: nodes[sampler.node].name ?? '' }))
        peak = Math.max(peak, peakOf(again[i], 14, 25));
    });
    expect(outside).toBeLessThanOrEqual(1e-7);
    // deg/s; 813 of it is the untouched segment 14–15 of lowerleg.r, and before it was 1,853 and 2,022.
    expect(peak).toBeLessThanOrEqual(850);
    expect(peak).toBeGreaterThan(800);

    const undone = await at.run('mend', 'out.glb', '--undo', 'undo.json', '-o', 'back.glb');
    expect(undone.code).toBe(0);
    expect(hashOf(readFileSync(at.path('back.glb')))).toBe(hashOf(old));
  });

  test('reads as well as before: validator, glTF-Transform, three.js', async () => {
    const at = await inFolder(adventurer);
    await at.run('mend', 'in.glb', '--proposed', '-o', 'out.glb');
    const old = adventurer.read();
    const made = new Uint8Array(readFileSync(at.path('out.glb')));
    expect(countsOf(await validateBytes(made))).toEqual(countsOf(await validateBytes(old)));
    const document = await new WebIO().readBinary(made);
    expect(document.getRoot().listAnimations()).toHaveLength(9);
    const { animations } = await new GLTFLoader().parseAsync(made.buffer, '');
    expect(
      animations.flatMap((clip) => clip.tracks).filter((track) => track.name.endsWith('.quaternion')),
    ).toHaveLength(369);
  });

  test('changes by its own job card just as by what was proposed, to the byte', async () => {
    const at = await inFolder(adventurer);
    await at.run('mend', 'in.glb', '--proposed', '-o', 'one.glb', '--card-out', 'card.json');
    await at.run('mend', 'in.glb', '--card', 'card.json', '-o', 'two.glb');
    expect(hashOf(readFileSync(at.path('two.glb')))).toBe(hashOf(readFileSync(at.path('one.glb'))));
  });
});

describe.skipIf(cube.absent)('spinning-cube.glb', { timeout: 60_000 }, () => {
  test('turns by two half turns; both ways of each are shown', async () => {
    const at = await inFolder(cube);
    const checked = await at.run('check', 'in.glb', '--format', 'json');
    const halves = findingsOf(reportOf(checked)).filter((finding) => finding.rule === 'turn.half');
    expect(halves.map((finding) => finding.count)).toEqual([2]);
    for (const { ways = [] } of halves[0].occurrences) {
      expect(ways).toHaveLength(2);
      expect(ways[0].axis.map((x, i) => Math.abs(x + ways[1].axis[i]))).toEqual([
        expect.closeTo(0, 6),
        expect.closeTo(0, 6),
        expect.closeTo(0, 6),
      ]);
      expect(ways[0].angle + ways[1].angle).toBeCloseTo(360, 3);
    }
  });

  test('turns the chosen way after choose side, whatever the last digits of its keys', async () => {
    const at = await inFolder(cube);
    const card = reportOf(await at.run('check', 'in.glb', '--format', 'json'));
    const steps = findingsOf(card)
      .flatMap((finding) => finding.occurrences)
      .flatMap((place) => place.remedy ?? [])
      .filter((step) => step.verb === 'choose side')
      .toSorted((a, b) => (b.keys?.[0] ?? 0) - (a.keys?.[0] ?? 0));
    expect(steps).toHaveLength(2);
    writeFileSync(at.path('card.json'), JSON.stringify({ schemaVersion: 1, steps }));
    expect((await at.run('mend', 'in.glb', '--card', 'card.json', '-o', 'out.glb')).code).toBe(0);
    const [sampler] = rotationSamplers(new Uint8Array(readFileSync(at.path('out.glb'))));
    expect(sampler.times).toHaveLength(5);
    const wanted = directionsOf(sampler.output);
    // Every sign pattern of ±1e-6 on the four numbers of two neighbouring keys: 256 a segment.
    for (let key = 0; key < 4; key++)
      for (let pattern = 0; pattern < 256; pattern++) {
        const moved = sampler.output.map((x, i) =>
          i >= key * 4 && i < key * 4 + 8 ? x + (pattern & (1 << (i - key * 4)) ? 1e-6 : -1e-6) : x,
        );
        directionsOf(moved).forEach((direction, i) => expect(dot(direction, wanted[i])).toBeGreaterThan(0));
      }
  });
});

/** Turn axis of each segment under the text's short-way rule. */
function directionsOf(output: readonly number[]): number[][] {
  const keys = Array.from({ length: output.length / 4 }, (_, key) => output.slice(key * 4, key * 4 + 4));
  return keys.slice(1).map((b, i) => {
    const a = keys[i];
    const sign = dot(a, b) < 0 ? -1 : 1;
    // Vector part of b a*: the axis in the parent's frame.
    return [
      sign * (-b[3] * a[0] + b[0] * a[3] - b[1] * a[2] + b[2] * a[1]),
      sign * (-b[3] * a[1] + b[1] * a[3] - b[2] * a[0] + b[0] * a[2]),
      sign * (-b[3] * a[2] + b[2] * a[3] - b[0] * a[1] + b[1] * a[0]),
    ];
  });
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, x, i) => sum + x * b[i], 0);
}

function peakOf(sampler: ReturnType<typeof rotationSamplers>[number], from: number, to: number): number {
  let peak = 0;
  for (let key = from; key < to; key++) {
    const angle = degreesBetween(
      sampler.output.slice(key * 4, key * 4 + 4),
      sampler.output.slice(key * 4 + 4, key * 4 + 8),
    );
    peak = Math.max(peak, angle / (sampler.times[key + 1] - sampler.times[key]));
  }
  return peak;
}

/** Where the report's steps say that they acted. Bridges and lifts act between the keys around those that they name. */
function spansOf(report: Report): { clip: string; node: number; from: number; to: number }[] {
  const samplers = rotationSamplers(adventurer.read());
  return (report.steps ?? []).flatMap(({ step }) => {
    const track = report.files[0].tracks.find(
      (other) => other.clip === step.clip && other.track === step.track,
    );
    const sampler = samplers.find((other) => other.clip === step.clip && other.node === track?.node);
    if (!sampler || !track) throw new Error(`${step.track} is not in the file`);
    const timeOf = (key: number): number =>
      sampler.times[Math.min(sampler.times.length - 1, Math.max(0, key))];
    return (step.keys ?? []).map((key) => {
      // EDITS: a bridge of n steps at a shelf of key k runs from key k − 1 − ⌊n/2⌋ to n keys later; lift out moves one key.
      const steps = step.steps ?? 4;
      const from = step.verb === 'bridge' ? key - 1 - Math.floor(steps / 2) : key - 1;
      return {
        clip: step.clip,
        node: track.node,
        from: timeOf(from),
        to: timeOf(step.verb === 'bridge' ? from + steps : key + 1),
      };
    });
  });
}

function countsOf({ issues }: Validation): unknown {
  const counts = new Map<string, number>();
  for (const { code } of issues.messages) counts.set(code, (counts.get(code) ?? 0) + 1);
  return Object.fromEntries([...counts].toSorted(([a], [b]) => a.localeCompare(b)));
}

function hashOf(bytes: Uint8Array): string {
  return createHash('sha256').update(bytes).digest('hex');
}
