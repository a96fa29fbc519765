import { openAnimation, type AnimationFile, type OpenOptions, type Source } from '@slewcurve/formats';

/** An animation file and the bytes it was read from. */
export interface OpenedFile {
  readonly name: string;
  readonly source: Source;
  readonly file: AnimationFile;
}

/**
 * Open an animation file.
 *
 * @throws SlewcurveError what `openAnimation` throws: the file can't be read as its format
 */
export async function openFile(source: Source, options: OpenOptions): Promise<OpenedFile> {
  return { name: options.name, source, file: await openAnimation(source, options) };
}
