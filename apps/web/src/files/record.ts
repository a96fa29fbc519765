/** What stands beside animations and is no animation: stamps, house rules. */
export interface ChosenRecord {
  readonly kind: 'stamps' | 'house rules';
  /** Path within what was chosen. */
  readonly path: string;
  readonly blob: Blob;
}

const STAMPS = /\.stamps\.json$/i;

/** The records among what was chosen. `.json` that no animation stands beside must be house rules; beside one, only what is called so. */
export function recordsAmong(
  files: readonly { readonly path: string; readonly file: Blob }[],
  animations: boolean,
): ChosenRecord[] {
  return files.flatMap(({ path, file }): ChosenRecord[] => {
    if (STAMPS.test(path)) return [{ kind: 'stamps', path, blob: file }];
    const isRules = /\.json$/i.test(path) && (!animations || /rules[^/]*$/i.test(path));
    return isRules ? [{ kind: 'house rules', path, blob: file }] : [];
  });
}

/** The path of the animation that stamps are for: `walk.glb.stamps.json` stands beside `walk.glb`. */
export function stampedPath(path: string): string {
  return path.replace(STAMPS, '');
}

/** JSON out of a file. @throws Error that says in which file it is wrong */
export async function readJson({ path, blob }: ChosenRecord): Promise<unknown> {
  try {
    const json: unknown = JSON.parse(await blob.text());
    return json;
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error);
    throw new Error(`${path} is no JSON: ${why}`, { cause: error });
  }
}
