import { type Json, type JsonObject, isObject, listMember, member } from '../json-value.js';
import { samplerPointer } from './rotation-channel.js';

/** JSON pointers of what reads each accessor, by accessor. */
export type AccessorReaders = ReadonlyMap<number, readonly string[]>;

/** Everything in a document that names an accessor, as far as glTF 2.0 and its ratified extensions say. */
export function accessorReaders(json: JsonObject): AccessorReaders {
  const readers = new Map<number, string[]>();
  const add = (index: Json | undefined, pointer: string): void => {
    if (typeof index !== 'number') return;
    const known = readers.get(index);
    if (known) known.push(pointer);
    else readers.set(index, [pointer]);
  };
  listMember(json, 'animations').forEach((clip, c) =>
    listMember(clip, 'samplers').forEach((sampler, s) => {
      add(member(sampler, 'input'), `${samplerPointer(c, s)}/input`);
      add(member(sampler, 'output'), `${samplerPointer(c, s)}/output`);
    }),
  );
  listMember(json, 'skins').forEach((skin, i) =>
    add(member(skin, 'inverseBindMatrices'), `/skins/${i}/inverseBindMatrices`),
  );
  listMember(json, 'meshes').forEach((mesh, m) =>
    listMember(mesh, 'primitives').forEach((primitive, p) => {
      const pointer = `/meshes/${m}/primitives/${p}`;
      add(member(primitive, 'indices'), `${pointer}/indices`);
      addAll(member(primitive, 'attributes'), `${pointer}/attributes`, add);
      listMember(primitive, 'targets').forEach((target, t) => addAll(target, `${pointer}/targets/${t}`, add));
    }),
  );
  listMember(json, 'nodes').forEach((node, n) => {
    const instancing = member(member(node, 'extensions'), 'EXT_mesh_gpu_instancing');
    addAll(
      member(instancing, 'attributes'),
      `/nodes/${n}/extensions/EXT_mesh_gpu_instancing/attributes`,
      add,
    );
  });
  return readers;
}

function addAll(
  object: Json | undefined,
  pointer: string,
  add: (index: Json | undefined, pointer: string) => void,
): void {
  if (!isObject(object)) return;
  for (const [name, index] of Object.entries(object))
    add(index, `${pointer}/${name.replaceAll('~', '~0').replaceAll('/', '~1')}`);
}
