import { SlewcurveError } from '@slewcurve/core';
import {
  checkPatchPlan,
  parsePatchPlan,
  patchPlanJson,
  patchedSource,
  type Source,
} from '@slewcurve/formats';
import type { MendedFile } from './mend-file.js';
import { sha256Of } from './sha256-of.js';
import { UNWATCHED, type Watch } from './watch.js';

/** What takes a mended file back, and the hashes of both files. */
export interface UndoPlan {
  /** JSON text for `takeBack`, as `--undo-out` writes it. */
  readonly text: string;
  readonly mended: { readonly size: number; readonly sha256: string };
  readonly original: { readonly size: number; readonly sha256: string };
}

/**
 * The plan that makes the old file from the mended one.
 *
 * @throws SlewcurveError `job.stopped`
 */
export async function undoPlan(
  { opened, result, undo }: MendedFile,
  watch: Watch = UNWATCHED,
): Promise<UndoPlan> {
  const mended = { size: result.size, sha256: await sha256Of(result, watch) };
  const original = { size: opened.source.size, sha256: await sha256Of(opened.source, watch) };
  const text = patchPlanJson({
    for: { file: opened.name, sha256: mended.sha256 },
    resultSha256: original.sha256,
    plan: undo,
  });
  return { text, mended, original };
}

/**
 * The file that a mended file was made from.
 *
 * @param text what `undoPlan` gave, from wherever it was kept
 * @throws SlewcurveError `undo.already-done` where the bytes are the old ones, `undo.other-file` where the plan is for other bytes, `undo.broken` where it makes other bytes than it says, and
 *   what `parsePatchPlan` throws
 */
export async function takeBack(mended: Source, text: string, name: string): Promise<Source> {
  const stored = parsePatchPlan(text);
  const sha256 = await sha256Of(mended);
  if (sha256 === stored.resultSha256)
    throw new SlewcurveError(
      'undo.already-done',
      `${name} is as it was before the change: there is nothing to take back. Nothing was written.`,
      { file: name },
    );
  if (sha256 !== stored.for.sha256)
    throw new SlewcurveError(
      'undo.other-file',
      `The plan takes back a change of ${stored.for.file}, and ${name} holds other bytes than that file had. Nothing was written.`,
      { file: name },
    );
  checkPatchPlan(stored.plan, mended.size);
  const original = patchedSource(mended, stored.plan);
  if (original.size === stored.plan.size && (await sha256Of(original)) === stored.resultSha256)
    return original;
  throw new SlewcurveError(
    'undo.broken',
    `The plan does not make the file that it names: it was changed by somebody. Nothing was written.`,
    { file: name },
  );
}
