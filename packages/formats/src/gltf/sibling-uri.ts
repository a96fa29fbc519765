import { SlewcurveError } from '@slewcurve/core';

/** Names that Windows gives to devices, with any ending ("Naming Files, Paths, and Namespaces", Microsoft). */
const DEVICE = /^(con|prn|aux|nul|com[0-9¹²³]|lpt[0-9¹²³]|conin\$|conout\$) *(\..*)?$/i;

/**
 * The relative path that a buffer's URI names, percent-decoded, `/`-separated. Only a file beside the asset or below it is
 * let through: no scheme, no root, no `..`, no device, no control character.
 *
 * @throws SlewcurveError `gltf.refused-uri`
 */
export function siblingPath(uri: string, file: string, pointer: string): string {
  const refuse = (why: string): SlewcurveError =>
    new SlewcurveError(
      'gltf.refused-uri',
      `${file}: ${pointer} names "${uri.slice(0, 120)}", which ${why}. Only files beside the asset or below it are read; put the buffer there.`,
      { file, pointer },
    );
  if (/^[a-z][a-z0-9+.-]*:/i.test(uri)) throw refuse('has a scheme');
  if (uri === '') throw refuse('is empty');
  let path: string;
  try {
    path = decodeURIComponent(uri);
  } catch {
    throw refuse('is not percent-encoded UTF-8');
  }
  // Decoding may have made a scheme, a drive letter or a separator that the raw text hid.
  if (/^[/\\]/.test(path)) throw refuse('starts at a root');
  if (path.includes('\\')) throw refuse('holds a backslash');
  if (path.includes(':')) throw refuse('holds a colon');
  if (/[?#]/.test(uri)) throw refuse('holds a query or a fragment');
  if (Array.from(path, (letter) => letter.charCodeAt(0)).some((code) => code < 32))
    throw refuse('holds a control character');
  const steps = path.split('/');
  if (steps.includes('..')) throw refuse('climbs out of the folder');
  if (steps.some((step) => DEVICE.test(step.replace(/[ .]+$/, '')))) throw refuse('names a device');
  return path;
}
