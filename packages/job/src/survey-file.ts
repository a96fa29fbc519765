import { SlewcurveError } from '@slewcurve/core';
import type { AnimationFile } from '@slewcurve/formats';
import { surveyTrack, type Finding } from '@slewcurve/survey';
import { clipReport } from './clip-report.js';
import type { FileReport, TrackReport } from './report.js';
import type { JobSettings } from './settings.js';
import { trackReport } from './track-report.js';
import { UNWATCHED, betweenSlices, type Watch } from './watch.js';

/**
 * Survey every rotation track of an opened file.
 *
 * @param name the file's name as given, forward slashes
 * @throws SlewcurveError `job.stopped`
 */
export async function surveyFile(
  name: string,
  file: AnimationFile,
  settings: JobSettings,
  watch: Watch = UNWATCHED,
): Promise<FileReport> {
  const tracks: TrackReport[] = [];
  const findings: Finding[] = [];
  const total = file.clips.reduce((sum, clip) => sum + clip.tracks.length, 0);
  for (const clip of file.clips)
    for (const track of clip.tracks) {
      tracks.push(trackReport(track, settings.playbacks[0] ?? 'as-written'));
      findings.push(...surveyTrack(track, { clip, nodes: file.nodes, file: name, ...settings }));
      await betweenSlices(watch, tracks.length, total, 'tracks');
    }
  return {
    file: name,
    status: 'surveyed',
    ...(file.problems.length > 0 && {
      problems: file.problems.map(({ code, level, message }) => ({ code, level, message })),
    }),
    clips: file.clips.map(clipReport),
    tracks,
    findings,
  };
}

/**
 * What is reported of a file that can't be read as its format.
 *
 * @throws what is no `SlewcurveError`: that is a fault of ours
 */
export function unreadableFile(name: string, error: unknown): FileReport {
  if (!(error instanceof SlewcurveError)) throw error;
  const { code, message } = error;
  return { file: name, status: 'unreadable', error: { code, message }, clips: [], tracks: [], findings: [] };
}
