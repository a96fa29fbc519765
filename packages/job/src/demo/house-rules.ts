import type { HouseRules } from '@slewcurve/survey';

const LENS = 'headland/lighthouse/lens';
const VANE = 'headland/mast/weather-vane';

/**
 * The demo scene's house rules: who is what, which clips repeat, how fast the mounts may turn, what the vane and the lens really
 * do. The cut of `quay-flight` is left for its reader to declare.
 */
export const kestrelPointRules: HouseRules = {
  roles: {
    '*/crane-head': 'machine',
    '*/scope': 'machine',
    '*/quay-camera': 'camera-screen',
    '*-hip': 'joint',
    '*-knee': 'joint',
    '*-ankle': 'joint',
    [LENS]: 'prop',
    [VANE]: 'prop',
  },
  // Degrees per second.
  limits: { machine: { 'limit.speed': 30 } },
  exceptions: [{ where: { clip: 'scope-pass' }, limits: { machine: { 'limit.speed': 20 } } }],
  levels: {},
  loops: ['lens-*', 'beetle-*'],
  declared: {
    cuts: [],
    holds: [{ clip: 'vane-creep', track: VANE, span: [0, 20] }],
    whips: ['vane-gusts', 'vane-coarse'].flatMap((clip) => [
      { clip, track: VANE, span: [5, 5.35] },
      { clip, track: VANE, span: [11, 11.3] },
    ]),
    spins: ['lens-thirds', 'lens-halves'].map((clip) => ({ clip, track: LENS, rpm: 6 })),
    marks: [],
    joins: [],
    blends: [],
  },
  playback: [],
  leaveOut: [],
};
