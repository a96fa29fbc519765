import { kestrelPoint, kestrelPointRules } from '@slewcurve/job';
import { describe, expect, test } from 'vitest';
import { demoManifest, WORKED_OUT } from './demo-manifest/demo-manifest.js';
import type { Entry } from './demo-manifest/entry.js';

const FILE = '../data/demo-manifest.json';
const ABOUT =
  'Every finding at note or above of the named rules on the demo scene under its own house rules, played as written. ' +
  "Worked out by test/reference/demo-manifest from the rules' text, with a reader and quaternion maths of its own; it imports " +
  'nothing of the packages. Keys are zero-based; of a segment the later key. `npx vitest run --project node ' +
  'test/reference/demo-manifest -u` writes it anew.';

const found = demoManifest(kestrelPoint(), kestrelPointRules);

/** Clip and rule of every entry, with its keys. */
function listed(entries: readonly Entry[]): string[] {
  return entries.map(({ clip, rule, keys }) => `${clip} ${rule} ${keys.join(' ')}`.trimEnd());
}

describe('the demo scene, read independently', () => {
  test('gives the committed manifest', async () => {
    const lines = found.map((entry) => `    ${JSON.stringify(entry)}`).join(',\n');
    const text = `{\n  "about": ${JSON.stringify(ABOUT)},\n  "workedOut": ${JSON.stringify(WORKED_OUT)},\n  "findings": [\n${lines}\n  ]\n}\n`;
    await expect(text).toMatchFileSnapshot(FILE);
  });

  // The faults that were planted, and what follows from them.
  test('shows what was planted, and nothing else', () => {
    expect(listed(found)).toEqual([
      'lens-halves turn.half 1 2 3 4 5 6',
      'lens-halves turn.lost 1 2 3 4 5 6',
      'lens-halves pace.elbow 1 2 3 4',
      'lens-halves pace.axis-kick 1 2 3 4',
      'lens-doubled-end seam.loop-gap 300',
      'lens-doubled-end seam.doubled-end 300',
      'crane-head jump.freeze 1796 1797 1798 1799 1800',
      'crane-head jump.lone-key 412 1033 1760',
      'crane-head shake.grain',
      expect.stringMatching(/^crane-head shake\.hum \d+ \d+$/),
      'crane-head limit.speed 1033',
      'scope-pass limit.speed 750',
      'scope-pass horizon.overhead 751',
      'quay-flight turn.half 7',
      'quay-flight jump.cut-smear 7',
      'quay-flight pace.elbow 2 3 4 5 6 7 9',
      'quay-flight pace.hard-stop 0 10',
      'quay-flight limit.picture 1 5',
      'quay-flight horizon.roll 6 10',
      'beetle-hip turn.sign-flip 20',
      'beetle-knee seam.loop-gap 36',
      'beetle-ankle jump.shelf 22',
      'beetle-ankle seam.loop-gap 36',
      'vane-coarse file.coarse',
      'vane-creep shake.creep 0 1199',
    ]);
  });

  test('recovers the planted grain of 0.06° within 10 % and the hum of 11 Hz within 0.1 Hz', () => {
    const [grain, hum] = ['shake.grain', 'shake.hum'].map((id) => found.find(({ rule }) => rule === id));
    expect(Math.abs(grain!.value - 0.06)).toBeLessThan(0.006);
    expect(Math.abs(hum!.value - 11)).toBeLessThan(0.1);
    // Planted from 26 s to 31 s at 50 keys a second; a window that is half in the hum may or may not name it.
    expect(Math.abs(hum!.keys[0] - 1300)).toBeLessThan(63);
    expect(Math.abs(hum!.keys[1] - 1550)).toBeLessThan(63);
  });
});
