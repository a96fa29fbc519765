import { SlewcurveError, playAs } from '@slewcurve/core';
import {
  lookAtTable,
  openAnimation,
  type Source,
  type TableLook,
  type TableOptions,
} from '@slewcurve/formats';
import { significant } from '@slewcurve/survey';

/** What a table of text becomes by what people say of it: shown before it is accepted. */
export interface TableTrial extends TableLook {
  /** Tracks as they are read now, with their greatest speed, deg/s; none while something is still to be told. */
  readonly tracks: readonly { readonly track: string; readonly keys: number; readonly peakRate: number }[];
  /** Why it can't be read as it is told. */
  readonly problem?: { readonly code: string; readonly message: string };
}

const DEGREES = 180 / Math.PI;

/**
 * Tries what people say of a table: what is still open, and the tracks that come of it.
 *
 * @throws SlewcurveError what `lookAtTable` throws: no answer helps there
 */
export async function tryTable(source: Source, name: string, table: TableOptions = {}): Promise<TableTrial> {
  const look = await lookAtTable(source, name, table);
  if (look.silent.length > 0) return { ...look, tracks: [] };
  try {
    const { clips } = await openAnimation(source, { name, table });
    const tracks = clips.flatMap((clip) =>
      clip.tracks.map((track) => {
        const curve = playAs(track, 'as-written');
        const { rate } = curve.peak(curve.start, curve.end);
        return { track: track.id, keys: track.times.length, peakRate: significant(rate * DEGREES) };
      }),
    );
    return { ...look, tracks };
  } catch (error) {
    if (!(error instanceof SlewcurveError)) throw error;
    return { ...look, tracks: [], problem: { code: error.code, message: error.message } };
  }
}
