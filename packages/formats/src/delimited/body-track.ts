import {
  medianGap,
  regime,
  replaceTrack,
  storedTrack,
  type MatrixFlaws,
  type RotationTrack,
} from '@slewcurve/core';
import type { Body } from './layout.js';
import { type OrientationForm, orientationForm } from './orientation-form.js';
import type { Rows } from './row-reader.js';

/** A body's track as it was read, and where its numbers stand. */
export interface ReadBody {
  readonly track: RotationTrack;
  readonly body: Body;
  readonly form: OrientationForm;
  /** Row of each key: rows of a hole have none. */
  readonly rows: Int32Array;
  /** Most decimal places of each of the body's columns. */
  readonly decimals: readonly number[];
  /** The numbers of a row as written. */
  text(row: number): readonly number[];
}

/** A gap this many times the median is a hole of the capture. */
const HOLE = 2.5;

/**
 * The track of one body. A row without any number of it (`nan`, or nothing) is a declared hole: it is no key, and nothing is
 * interpolated across it. Nor is anything across a gap of more than 2.5 median gaps where keys are dense, as they are in a capture;
 * keys set by hand may stand as far apart as they like.
 *
 * @param first where the body's columns begin among those that were read
 */
export function bodyTrack(
  rows: Rows,
  body: Body,
  first: number,
  place: { readonly id: string; readonly clip: string; readonly node: number },
): ReadBody {
  const { stamps, numbers } = rows;
  const form = orientationForm(body.form);
  const text = (row: number): number[] => body.columns.map((_, i) => numbers.value(row, first + i));
  const keyRows: number[] = [];
  const breaks: number[] = [];
  for (let row = 0; row < numbers.rows(); row++) {
    if (!text(row).every(Number.isNaN)) keyRows.push(row);
    else if (keyRows.length > 0 && breaks.at(-1) !== keyRows.length - 1) breaks.push(keyRows.length - 1);
  }
  const values = new Float64Array(form.perKey * keyRows.length);
  keyRows.forEach((row, key) => values.set(form.read(text(row)), form.perKey * key));
  const decimals = rows.decimals.slice(first, first + body.columns.length);
  const whole = keyRows.length === stamps.seconds.length;
  const track = storedTrack({
    id: place.id,
    clip: place.clip,
    times: whole ? stamps.seconds : Float64Array.from(keyRows, (row) => stamps.seconds[row] ?? NaN),
    values,
    ...form.track,
    breaks,
    storage: { ...form.storage(decimals), timeComponent: 'text', timeDecimals: stamps.decimals },
    source: {
      clip: place.clip,
      clipIndex: 0,
      node: place.node,
      values: body.columns[0] ?? 0,
      ...flawsOf(form, keyRows, text),
      sharedWith: [],
    },
  });
  return { track: withGaps(track), body, form, rows: Int32Array.from(keyRows), decimals, text };
}

/** What keeps a body's matrices from being turns; nothing where it stores none. */
function flawsOf(
  form: OrientationForm,
  rows: readonly number[],
  text: ReadBody['text'],
): { matrices?: MatrixFlaws } {
  if (!form.flaw) return {};
  const flaws = rows.map((row) => form.flaw?.(text(row)));
  return {
    matrices: {
      reflected: Uint8Array.from(flaws, (flaw) => (flaw?.reflected === true ? 1 : 0)),
      shear: Float64Array.from(flaws, (flaw) => flaw?.shear ?? 0),
    },
  };
}

function withGaps(track: RotationTrack): RotationTrack {
  if (regime(track) === 'sparse') return track;
  const hole = HOLE * medianGap(track);
  const breaks = new Set(track.breaks);
  for (let key = 0; key + 1 < track.times.length; key++)
    if ((track.times[key + 1] ?? NaN) - (track.times[key] ?? NaN) > hole) breaks.add(key);
  if (breaks.size === track.breaks.length) return track;
  return replaceTrack(track, { breaks: Array.from(track.times.keys()).filter((key) => breaks.has(key)) });
}
