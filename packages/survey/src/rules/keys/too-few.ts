import type { ComparisonRule } from '../../comparison-rule.js';

/** Keys that were taken away and are missed. */
export const tooFew: ComparisonRule = Object.freeze({
  id: 'keys.too-few',
  family: 'keys',
  level: 'error',
  alsoCalled: ['undersampled', 'over-reduced', 'key reduction error', 'lost detail', 'thinned too far'],
  summary: 'A track with fewer keys than its source plays further off than is allowed.',
  untouched: 'both files',
  page: {
    what: 'Keys were taken out of a copy, by a frame rate that is too low or a reduction that looked at the keys alone, and the motion between those that stayed is another.',
    trace: 'Peaks that are cut off and humps that are straight, against the source.',
    standard: 'glTF 2.0 says nothing of how keys were chosen.',
    programs:
      'Exporters, importers and packers thin and round, each by a tolerance of its own that seldom looks at speed.',
    people: 'Feet that slide, contacts that miss, a pose that is passed by.',
    test: 'Of `slewcurve compare SOURCE COPY` with `--angle` or `--rate`: a track of the copy has fewer keys than that of the source, and as played it is at some time further off than the angle, or over some key interval off by more than the rate.',
    source: 'Whoever compares names the limits; there is no threshold of its own.',
    spares: 'Differences within the limits, and keys that a straight turn replaces.',
    remedy: 'Take the copy anew with more keys, or with a tolerance on speed as well as on angle.',
  },
});
