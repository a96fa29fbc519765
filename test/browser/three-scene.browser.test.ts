// The packages in a three.js scene (three 0.187, the general-purpose 3-D library), from a fresh project, bundled by Vite, run by Chromium.
// What three itself shows is held against the exact curve and against three's own interpolant.
import { build } from 'vite';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { chromium, type Browser } from 'playwright';
import { findChromium } from '../../.ci/chromium.mjs';
import { freshProject, type FreshProject } from '../support/fresh-project.js';

const SCENE = `
import { AnimationClip, AnimationMixer, Interpolant, Object3D, QuaternionKeyframeTrack } from 'three';
import { angleBetween, playAs, rotationTrack } from '@slewcurve/core';
import { sampler } from '@slewcurve/core/sampler';

// 90° about y in the first second, then 90° about x: a sign flip is stored at the last key.
const times = [0, 1, 2];
const h = Math.SQRT1_2;
const values = [0, 0, 0, 1, 0, h, 0, h, -0.5, -0.5, 0.5, -0.5];
const track = rotationTrack({ times, values });
const curve = playAs(track, 'as-written');
const SIXTY = Array.from({ length: 121 }, (_, k) => k / 60);

/** A curve on an Object3D: the curve writes into three's own quaternion array. */
function onObject() {
  const object = new Object3D();
  const q = new Float64Array(4);
  return SIXTY.map((t) => {
    object.quaternion.fromArray(curve.orientation(q, t));
    object.updateMatrixWorld();
    const shown = object.getWorldQuaternion(object.quaternion.clone()).toArray();
    return angleBetween(shown, q);
  });
}

class SamplerInterpolant extends Interpolant {
  constructor(keyed, compiled, result) {
    super(keyed.times, keyed.values, keyed.getValueSize(), result);
    this.compiled = compiled;
  }
  evaluate(t) {
    return this.compiled.sample(t, this.resultBuffer);
  }
}

/** A clip of three's, its track played through our sampler in place of three's interpolant. */
function onClip(ours) {
  const object = new Object3D();
  object.name = 'head';
  const keyed = new QuaternionKeyframeTrack('head.quaternion', times, values);
  if (ours) {
    const compiled = sampler(track);
    keyed.createInterpolant = (result) => new SamplerInterpolant(keyed, compiled, result);
  }
  const player = new AnimationMixer(object);
  player.clipAction(new AnimationClip('turn', 2, [keyed])).play();
  const q = new Float64Array(4);
  return SIXTY.slice(0, 120).map((t) => {
    player.setTime(t);
    return angleBetween(object.quaternion.toArray(), curve.orientation(q, t));
  });
}

window.measured = { object: Math.max(...onObject()), ours: Math.max(...onClip(true)), theirs: Math.max(...onClip(false)) };
`;

let project: FreshProject;
let browser: Browser;
beforeAll(async () => {
  project = freshProject();
  browser = await chromium.launch({ executablePath: findChromium() });
});
afterAll(async () => {
  await browser.close();
  project.remove();
});

describe('in a three.js scene', () => {
  test('a curve turns an Object3D, and a clip plays through the sampler, as exactly as stored', async () => {
    project.write('scene.js', SCENE);
    const result = await build({
      root: project.folder,
      configFile: false,
      logLevel: 'silent',
      build: { write: false, rolldownOptions: { input: `${project.folder}/scene.js` } },
    });
    if (!('output' in result)) throw new Error('expected one output');
    const page = await browser.newPage();
    await page.addScriptTag({ content: result.output[0].code, type: 'module' });
    await page.waitForFunction('window.measured !== undefined');
    const measured: { object: number; ours: number; theirs: number } = await page.evaluate('window.measured');
    // Radians. three composes and takes apart a matrix in float64: 1e-7 is loose by far.
    expect(measured.object).toBeLessThan(1e-7);
    // three's clip keeps its values in float32: 2^-24 of a unit component is 1.2e-7 rad; four of them, twice.
    expect(measured.ours).toBeLessThan(1e-6);
    expect(measured.theirs).toBeLessThan(1e-6);
  });
});
