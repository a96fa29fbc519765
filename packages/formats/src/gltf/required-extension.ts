import { type Json, type JsonObject, isObject, listMember, member } from '../json-value.js';

/**
 * The extension on this object that the file says nobody may read it without (`extensionsRequired`): whatever else the object says may
 * mean something else then. Undefined where there is none.
 */
export function requiredExtension(document: JsonObject, json: Json | undefined): string | undefined {
  const extensions = member(json, 'extensions');
  if (!isObject(extensions)) return undefined;
  const required = listMember(document, 'extensionsRequired');
  return Object.keys(extensions).find((name) => required.includes(name));
}
