import type { Word } from '@slewcurve/survey';

/** Parts of the page and what else people call them: the find field leads there too. */
export const PAGE_WORDS: readonly Word[] = [
  {
    kind: 'page',
    name: 'Chart',
    summary:
      'One track’s angular speed over time, with its keys; a finding’s remedy, or an edit of yours, is applied there.',
    alsoCalled: [
      'curve editor',
      'animation curve',
      'keyframe',
      'graph',
      'angular velocity',
      'acceleration',
      'jerk',
      'total rotation',
      'odometer',
    ],
  },
  {
    kind: 'page',
    name: '3-D view',
    summary: 'Beside the chart: the paths of two body axes, the in-betweens and the turn axis.',
    alsoCalled: ['porthole', 'motion path', 'in-betweens', 'preview', 'viewport', 'ghosts'],
  },
  {
    kind: 'page',
    name: 'Docket',
    summary: 'The report of what was found and mended, to be printed or handed on.',
    alsoCalled: ['report', 'print', 'export'],
  },
  {
    kind: 'page',
    name: 'Stamps and house rules',
    summary:
      'A finding is accepted with a reason on its note in the margin; limits are set for a project by a house-rules file that is dropped on the page. The slewcurve command does the same: --stamp, --baseline, --rules.',
    alsoCalled: [
      'suppress',
      'waive',
      'ignore',
      'accept',
      'threshold',
      'config',
      'limits',
      'baseline',
      'tolerance',
    ],
  },
];
