import { SlewcurveError } from '@slewcurve/core';
import { decodeBase64, encodeBase64 } from './base64.js';
import { type Json, countMember, isObject, member, parseJsonText, shown, textMember } from './json-value.js';
import type { PatchPlan, PatchRange } from './patch-plan.js';

/** A patch plan with the files that it leads from and to, as `--undo-out` writes it. */
export interface StoredPatchPlan {
  /** The file that the plan is for: its name, and SHA-256 of its bytes in 64 lower-case hexadecimal digits. */
  readonly for: { readonly file: string; readonly sha256: string };
  /** SHA-256 of the file that the plan makes. */
  readonly resultSha256: string;
  readonly plan: PatchPlan;
}

const VERSION = 1;

/** The plan as JSON text (bytes in base64), ending in a line feed. */
export function patchPlanJson(stored: StoredPatchPlan): string {
  const { plan } = stored;
  const ranges = plan.ranges.map(({ at, length, bytes, what }) => ({
    at,
    length,
    bytes: encodeBase64(bytes),
    what,
  }));
  const json = {
    schemaVersion: VERSION,
    for: { file: stored.for.file, sha256: stored.for.sha256 },
    result: { sha256: stored.resultSha256, size: plan.size },
    ranges,
  };
  return `${JSON.stringify(json, undefined, 2)}\n`;
}

/**
 * Reads a stored plan from text that nobody vouches for. Whether it fits a file is `checkPatchPlan`'s question and its
 * hash's.
 *
 * @throws SlewcurveError `plan.not-json`, `plan.version`, `plan.bad-member`, `plan.bad-range`
 */
export function parsePatchPlan(text: string): StoredPatchPlan {
  const json = parsed(text);
  const version = member(json, 'schemaVersion');
  if (version !== VERSION)
    throw new SlewcurveError(
      'plan.version',
      `The plan's schemaVersion is ${shown(version)}; version ${VERSION} is read. Use the program that wrote it.`,
      { pointer: '/schemaVersion' },
    );
  const target = member(json, 'for');
  const result = member(json, 'result');
  const size = countMember(result, 'size');
  const file = textMember(target, 'file');
  if (file === undefined) throw badMember('/for/file', 'must be text', member(target, 'file'));
  if (size === undefined) throw badMember('/result/size', 'must be a whole number', member(result, 'size'));
  const list = member(json, 'ranges');
  if (!Array.isArray(list)) throw badMember('/ranges', 'must be a list', list);
  const ranges = list.map((range: Json, index) => rangeOf(range, `/ranges/${index}`));
  checkOrder(ranges);
  return {
    for: { file, sha256: hash(target, '/for') },
    resultSha256: hash(result, '/result'),
    plan: Object.freeze({ ranges: Object.freeze(ranges), size }),
  };
}

function parsed(text: string): Json {
  try {
    const json = parseJsonText(text);
    if (isObject(json)) return json;
  } catch (cause) {
    throw new SlewcurveError(
      'plan.not-json',
      `The plan is no JSON. It was cut short or is another file.`,
      {},
      { cause },
    );
  }
  throw new SlewcurveError('plan.not-json', 'The plan must be one JSON object.');
}

function hash(owner: Json | undefined, pointer: string): string {
  const digits = textMember(owner, 'sha256');
  if (digits === undefined || !/^[0-9a-f]{64}$/.test(digits))
    throw badMember(`${pointer}/sha256`, 'must be 64 lower-case hexadecimal digits', member(owner, 'sha256'));
  return digits;
}

function rangeOf(json: Json, pointer: string): PatchRange {
  const at = countMember(json, 'at');
  const length = countMember(json, 'length');
  if (at === undefined) throw badMember(`${pointer}/at`, 'must be a whole number', member(json, 'at'));
  if (length === undefined)
    throw badMember(`${pointer}/length`, 'must be a whole number', member(json, 'length'));
  const bytes = decodeBase64(textMember(json, 'bytes') ?? '*');
  if (!bytes) throw badMember(`${pointer}/bytes`, 'must be base64', member(json, 'bytes'));
  return { at, length, bytes, what: textMember(json, 'what') ?? '' };
}

function checkOrder(ranges: readonly PatchRange[]): void {
  let end = 0;
  for (const [index, { at, length }] of ranges.entries()) {
    if (at < end || !Number.isSafeInteger(at + length))
      throw new SlewcurveError(
        'plan.bad-range',
        `Range ${index} of the plan starts at byte ${at}; the one before it ends at ${end}. Ranges must be ascending and apart.`,
        { pointer: `/ranges/${index}/at`, byte: at },
      );
    end = at + length;
  }
}

function badMember(pointer: string, must: string, value: Json | undefined): SlewcurveError {
  return new SlewcurveError('plan.bad-member', `${pointer} of the plan ${must}; it is ${shown(value)}.`, {
    pointer,
  });
}
