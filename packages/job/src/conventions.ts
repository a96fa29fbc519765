import type { AnimationFile, TableOptions } from '@slewcurve/formats';

/** An axis with its direction. */
export type Up = '+x' | '-x' | '+y' | '-y' | '+z' | '-z';

/** Every direction that can be up. */
export const UPS: readonly Up[] = Object.freeze(['+y', '+z', '+x', '-y', '-z', '-x']);

/** What people say of a file where it is silent. */
export interface SaidConventions {
  readonly table?: TableOptions;
  readonly up?: Up;
  readonly hand?: 'right' | 'left';
  /** In whose axes its orientations are. */
  readonly space?: 'parent' | 'world';
}

/** One convention that a file is read by, and who says so. */
export interface Convention {
  readonly what: 'up axis' | 'handedness' | 'components' | 'angle sequence' | 'angle unit' | 'space';
  readonly is: string;
  /** `format`: its standard or common practice; `file`: the file itself; `you`; `nobody`: it is assumed and changes no number. */
  readonly toldBy: 'format' | 'file' | 'you' | 'nobody';
}

/** What a file is read by: asked once, shown always. */
export function conventionsOf(file: AnimationFile, said: SaidConventions = {}): readonly Convention[] {
  if (file.format === 'glb' || file.format === 'gltf')
    return [
      told('up axis', '+y', 'format'),
      told('handedness', 'right', 'format'),
      told('components', 'x y z w', 'format'),
      space(said, 'format'),
    ];
  const asked = [
    said.up === undefined ? told('up axis', 'not told', 'nobody') : told('up axis', said.up, 'you'),
    said.hand === undefined ? told('handedness', 'right', 'nobody') : told('handedness', said.hand, 'you'),
  ];
  if (file.format === 'bvh')
    return [
      ...asked,
      told('angle sequence', sequencesOf(file), 'file'),
      told('angle unit', 'degrees', 'format'),
      space(said, 'format'),
    ];
  return [...asked, ...tableConventions(file, said.table ?? {}), space(said, 'nobody')];
}

function tableConventions(file: AnimationFile, { columns, euler, unit }: TableOptions): Convention[] {
  const by = columns === undefined ? 'file' : 'you';
  const isAngles = file.clips.some(({ tracks }) =>
    tracks.some(({ interpolation }) => interpolation === 'EULER'),
  );
  if (!isAngles) return [told('components', 'as the columns are named', by)];
  return [
    told('angle sequence', sequencesOf(file), euler === undefined ? by : 'you'),
    unit === undefined
      ? told('angle unit', 'as the columns are named', by)
      : told('angle unit', unit === 'deg' ? 'degrees' : 'radians', 'you'),
  ];
}

function sequencesOf(file: AnimationFile): string {
  const found = file.clips.flatMap(({ tracks }) => tracks.flatMap(({ sequence }) => sequence ?? []));
  return [...new Set(found)].join(', ') || 'none';
}

function space({ space: whose }: SaidConventions, otherwise: Convention['toldBy']): Convention {
  return whose === undefined ? told('space', 'parent', otherwise) : told('space', whose, 'you');
}

function told(what: Convention['what'], is: string, toldBy: Convention['toldBy']): Convention {
  return { what, is, toldBy };
}

/** All conventions in one line: `up axis +y, handedness right (glTF 2.0); …`, grouped by who says so. */
export function sayConventions(conventions: readonly Convention[]): string {
  const groups: readonly (readonly [Convention['toldBy'], string])[] = [
    ['format', 'as its format has it'],
    ['file', 'as the file says'],
    ['you', 'as you say'],
    ['nobody', 'assumed'],
  ];
  return groups
    .flatMap(([by, words]) => {
      const own = conventions.filter(({ toldBy }) => toldBy === by);
      return own.length === 0 ? [] : [`${own.map(({ what, is }) => `${what} ${is}`).join(', ')} (${words})`];
    })
    .join('; ');
}
