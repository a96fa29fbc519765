import type { ComparisonRule } from '../../comparison-rule.js';

/** Keys that are all there and say something else. */
export const drift: ComparisonRule = Object.freeze({
  id: 'keys.drift',
  family: 'keys',
  level: 'error',
  alsoCalled: ['compression error', 'quantisation error', 'quantization error', 'packed drift', 'lossy'],
  summary: 'A track with no fewer keys than its source plays further off than is allowed.',
  untouched: 'both files',
  page: {
    what: 'Packing rounds each number; conversions between angles, axes and quaternions round again. The keys are all there and no longer say the same.',
    trace: 'The source’s line with a ripple on it, or beside itself.',
    standard: 'glTF 2.0 says nothing of how keys were chosen.',
    programs:
      'Exporters, importers and packers thin and round, each by a tolerance of its own that seldom looks at speed.',
    people: 'A hand that is not quite at the handle; slow turns that go by steps.',
    test: 'Of `slewcurve compare SOURCE COPY` with `--angle` or `--rate`: a track of the copy has as many keys as that of the source or more, and as played it is at some time further off than the angle, or over some key interval off by more than the rate. Speeds that the storage of both can’t tell apart are not counted.',
    source: 'Whoever compares names the limits; there is no threshold of its own.',
    spares: 'Differences within the limits; q and −q where the playback minds no signs.',
    remedy:
      'Store more bits, or pack from the source and not from a copy. `survey --matrix --storage …` tells beforehand what a storage costs.',
  },
});
