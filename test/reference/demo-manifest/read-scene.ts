// Reads the rotation tracks of a binary glTF file from the words of the glTF 2.0 text: little-endian chunks, LINEAR samplers.
import { turnVector, turned, unit, type Quat, type Vec } from './turns.js';

/** By role, then by rule; the demo sets `limit.speed` alone. */
type LimitTable = Readonly<Record<string, Readonly<Record<string, unknown>>>>;

/** What is read of the house rules. */
export interface Rules {
  readonly roles: Readonly<Record<string, string>>;
  readonly loops: readonly string[];
  readonly limits: LimitTable;
  readonly exceptions: readonly {
    readonly where: { readonly clip?: string; readonly track?: string };
    readonly limits?: LimitTable;
  }[];
  readonly declared: {
    readonly spins: readonly { readonly clip: string; readonly track: string; readonly rpm: number }[];
  };
}

const ROLES = ['joint', 'prop', 'camera-screen', 'machine'] as const;
type Role = (typeof ROLES)[number];

export interface Track {
  readonly clip: string;
  readonly track: string;
  readonly role: Role;
  readonly loop: boolean;
  /** Declared turns per minute. */
  readonly rpm?: number;
  /** deg/s that a house rule sets. */
  readonly speedLimit?: number;
  /** Horizontal view angle of the camera on the node, degrees. */
  readonly view?: number;
  readonly times: readonly number[];
  /** As stored, and made unit. */
  readonly stored: readonly Quat[];
  readonly keys: readonly Quat[];
  /** Angle floor in degrees: RULES' table. */
  readonly floor: number;
  /** Segments: turn in own axes and rate in parent axes, degrees and deg/s. */
  readonly steps: readonly Vec[];
  readonly rates: readonly Vec[];
  readonly speeds: readonly number[];
}

/* eslint-disable-next-line typescript/no-explicit-any -- parsed JSON of a file that the validator has passed */
type Json = any;

export function readScene(bytes: Uint8Array, rules: Rules): Track[] {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const jsonLength = view.getUint32(12, true);
  const json: Json = JSON.parse(new TextDecoder().decode(bytes.subarray(20, 20 + jsonLength)));
  const binAt = 20 + jsonLength + 8;
  const parents = new Map<number, number>();
  json.nodes.forEach((node: Json, i: number) => {
    for (const child of node.children ?? []) parents.set(child, i);
  });
  const pathOf = (node: number): string => {
    const parent = parents.get(node);
    return (parent === undefined ? '' : `${pathOf(parent)}/`) + json.nodes[node].name;
  };
  return json.animations.map((animation: Json): Track => {
    const [{ sampler, target }] = animation.channels;
    const { input, output } = animation.samplers[sampler];
    const times = numbers(json, view, binAt, input);
    const flat = numbers(json, view, binAt, output);
    const stored = times.map((_, k): Quat => [
      flat[4 * k],
      flat[4 * k + 1],
      flat[4 * k + 2],
      flat[4 * k + 3],
    ]);
    const role = roleOf(json, target.node, pathOf(target.node), rules);
    const { clip, track } = { clip: animation.name, track: pathOf(target.node) };
    return {
      clip,
      track,
      role,
      loop: rules.loops.some((pattern) => fits(pattern, clip)),
      rpm: rules.declared.spins.find((spin) => fits(spin.clip, clip) && fits(spin.track, track))?.rpm,
      speedLimit: speedLimit(rules, role, clip, track),
      view: viewOf(json, target.node),
      floor: json.accessors[output].componentType === 5120 ? 0.9 : 5.9e-6,
      times,
      stored,
      ...motion(times, stored),
    };
  });
}

function motion(
  times: readonly number[],
  stored: readonly Quat[],
): Pick<Track, 'keys' | 'steps' | 'rates' | 'speeds'> {
  const keys = stored.map(unit);
  const steps = keys.slice(1).map((key, k) => turnVector(keys[k], key));
  const rates = steps.map((step, k): Vec => {
    const [x, y, z] = turned(keys[k], step);
    const gap = times[k + 1] - times[k];
    return [x / gap, y / gap, z / gap];
  });
  return { keys, steps, rates, speeds: rates.map((rate) => Math.hypot(...rate)) };
}

function numbers(json: Json, view: DataView, binAt: number, index: number): number[] {
  const accessor = json.accessors[index];
  const at = binAt + (json.bufferViews[accessor.bufferView].byteOffset ?? 0) + (accessor.byteOffset ?? 0);
  const count = accessor.count * (accessor.type === 'VEC4' ? 4 : 1);
  return Array.from({ length: count }, (_, i) =>
    accessor.componentType === 5120
      ? Math.max(view.getInt8(at + i) / 127, -1)
      : view.getFloat32(at + 4 * i, true),
  );
}

function roleOf(json: Json, node: number, path: string, rules: Rules): Role {
  const declared = Object.entries(rules.roles).find(([pattern]) => fits(pattern, path));
  const known = ROLES.find((role) => role === declared?.[1]);
  if (known) return known;
  if (json.nodes[node].camera !== undefined) return 'camera-screen';
  return json.skins.some((skin: Json) => skin.joints.includes(node)) ? 'joint' : 'prop';
}

function viewOf(json: Json, node: number): number | undefined {
  const camera = json.cameras[json.nodes[node].camera]?.perspective;
  return camera && (Math.atan(Math.tan(camera.yfov / 2) * camera.aspectRatio) * 360) / Math.PI;
}

function speedLimit(rules: Rules, role: string, clip: string, track: string): number | undefined {
  const exception = rules.exceptions.find(
    ({ where }) => fits(where.clip ?? '*', clip) && fits(where.track ?? '*', track),
  );
  const speed = exception?.limits?.[role]?.['limit.speed'] ?? rules.limits[role]?.['limit.speed'];
  return typeof speed === 'number' ? speed : undefined;
}

/** `*` stands for anything. */
function fits(pattern: string, text: string): boolean {
  const parts = pattern.split('*').map((part) => part.replace(/[.+?^${}()|[\]\\]/g, String.raw`\$&`));
  return new RegExp(`^${parts.join('.*')}$`).test(text);
}
