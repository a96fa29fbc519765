import { type Json, type JsonObject, countMember, isObject, listMember, member } from '../json-value.js';
import { type AccessorLayout, AccessorFault, type Run, accessorLayout } from './accessor-layout.js';
import { runLength } from './accessor-data.js';
import type { Container } from './container.js';

interface Claim {
  readonly from: number;
  readonly to: number;
  /** The accessor that claims the bytes; -1 for anything else. */
  readonly accessor: number;
}

/**
 * The accessors whose bytes something else reads too: another accessor, an image, a compressed view, or a view that nothing
 * known reads (an extension may). Gaps between strided elements count as read.
 */
export function accessorsOnClaimedBytes(container: Container): ReadonlySet<number> {
  const claims = new Map<number, Claim[]>();
  const claim = (buffer: number, from: number, length: number, accessor: number): void => {
    if (length === 0) return;
    const known = claims.get(buffer);
    const made = { from, to: from + length, accessor };
    if (known) known.push(made);
    else claims.set(buffer, [made]);
  };
  const claimRun = (run: Run, accessor: number): void =>
    claim(run.buffer, run.offset, runLength(run), accessor);
  listMember(container.json, 'accessors').forEach((_, index) => {
    const layout = layoutOrNone(container, index);
    if (layout?.run) claimRun(layout.run, index);
    if (layout?.sparse) {
      claimRun(layout.sparse.indices, -1);
      claimRun(layout.sparse.values, -1);
    }
  });
  claimViews(container.json, claim);
  const shared = new Set<number>();
  for (const list of claims.values()) addOverlapped(list, shared);
  return shared;
}

function layoutOrNone(container: Container, index: number): AccessorLayout | undefined {
  try {
    return accessorLayout(container, index);
  } catch (error) {
    if (error instanceof AccessorFault) return undefined;
    throw error;
  }
}

function claimViews(
  json: JsonObject,
  claim: (buffer: number, from: number, length: number, accessor: number) => void,
): void {
  const byAccessors = viewsNamedIn(listMember(json, 'accessors'));
  const elsewhere = viewsNamedElsewhere(json);
  listMember(json, 'bufferViews').forEach((view, index) => {
    const extensions = member(view, 'extensions');
    // A view with an extension may be a second copy of the data, which would go stale.
    if (elsewhere.has(index) || !byAccessors.has(index) || isObject(extensions)) claimPart(view, claim);
    if (isObject(extensions))
      for (const name of Object.keys(extensions)) claimPart(member(extensions, name), claim);
  });
}

function claimPart(
  part: Json | undefined,
  claim: (buffer: number, from: number, length: number, accessor: number) => void,
): void {
  const buffer = countMember(part, 'buffer');
  if (buffer !== undefined)
    claim(buffer, countMember(part, 'byteOffset') ?? 0, countMember(part, 'byteLength') ?? 0, -1);
}

/** How many accessors name each view; without end where a sparse part, an image or anything else names it, or it is extended. */
export function countViewUsers({ json }: Container): Map<number, number> {
  const users = new Map<number, number>();
  for (const accessor of listMember(json, 'accessors')) {
    const view = countMember(accessor, 'bufferView');
    if (view !== undefined) users.set(view, (users.get(view) ?? 0) + 1);
    for (const part of viewsNamedIn([member(accessor, 'sparse') ?? null])) users.set(part, Infinity);
  }
  for (const view of viewsNamedElsewhere(json)) users.set(view, Infinity);
  listMember(json, 'bufferViews').forEach((view, index) => {
    if (isObject(member(view, 'extensions'))) users.set(index, Infinity);
  });
  return users;
}

function viewsNamedElsewhere(json: JsonObject): Set<number> {
  return viewsNamedIn(
    Object.entries(json).flatMap(([name, value]) =>
      name === 'accessors' || value === undefined ? [] : [value],
    ),
  );
}

/** Numbers of every member called `bufferView`, however deep. */
function viewsNamedIn(values: readonly Json[]): Set<number> {
  const named = new Set<number>();
  const left: Json[] = [...values];
  for (let value = left.pop(); value !== undefined; value = left.pop()) {
    const view = countMember(value, 'bufferView');
    if (view !== undefined) named.add(view);
    if (typeof value !== 'object' || value === null) continue;
    const children: readonly (Json | undefined)[] = Object.values(value);
    for (const child of children) if (typeof child === 'object') left.push(child);
  }
  return named;
}

/** Of claims sorted by their start, each that reaches into its cluster's neighbours is overlapped. */
function addOverlapped(claims: Claim[], overlapped: Set<number>): void {
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  claims.sort((a, b) => a.from - b.from);
  let furthest: Claim | undefined;
  for (const claim of claims) {
    if (furthest && claim.from < furthest.to) {
      overlapped.add(claim.accessor);
      overlapped.add(furthest.accessor);
    }
    if (!furthest || claim.to > furthest.to) furthest = claim;
  }
}
