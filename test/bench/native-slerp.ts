import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { sharedKeyPoses } from './cases/pose.js';
import { cpuMicroseconds, spread, type CaseResult } from './rounds.js';

const SOURCE = join(dirname(fileURLToPath(import.meta.url)), '../native/great-arcs.cpp');
const ROUNDS = 11;
const PEERS = ['glm', 'eigen'] as const;
const OURS = ['ours float64', 'ours float32'] as const;

/**
 * C++ GLM and Eigen beside our poses, 60 keys about 5° apart, in turns: their process, then ours. Nothing where `g++` or the headers
 * are not there, with a line that says so.
 */
export async function nativeResult(): Promise<CaseResult | undefined> {
  const folder = mkdtempSync(join(tmpdir(), 'bench-'));
  try {
    const program = join(folder, 'great-arcs');
    const flags = ['-O3', '-march=native', '-std=c++17', '-I/usr/include/eigen3'];
    if (spawnSync('g++', [...flags, SOURCE, '-o', program]).status !== 0) {
      console.log('C++ GLM and Eigen: left out, g++ or the headers of the two are not there.');
      return undefined;
    }
    const pose = (await sharedKeyPoses()).find(({ id }) => id === 'pose-60-scrub');
    const contenders = pose?.contenders.filter(({ name }) => OURS.some((ours) => ours === name)) ?? [];
    const times = new Map<string, number[]>([...PEERS, ...OURS].map((name) => [name, []]));
    for (let round = -2; round < ROUNDS; round++) {
      const printed = spawnSync(program, { encoding: 'utf8' }).stdout;
      for (const peer of PEERS)
        if (round >= 0) times.get(peer)?.push(Number(new RegExp(`${peer} (\\S+)`).exec(printed)?.[1]));
      for (const contender of contenders) {
        const { each } = cpuMicroseconds(contender, 300);
        if (round >= 0) times.get(contender.name)?.push((each * 1000) / (pose?.items ?? 1));
      }
    }
    const of = (name: string): readonly number[] => times.get(name) ?? [];
    return {
      id: 'native-pose-60-scrub',
      title: '80 joints, 60 shared keys about 5° apart, C++ (g++ -O3 -march=native)',
      unit: 'joint',
      contenders: [...times].map(([name, list]) => ({ name, nanoseconds: spread(list), checksum: 0 })),
      pairs: OURS.flatMap((ours) =>
        PEERS.map((peer) => ({ ours, peer, speedUp: spread(of(peer).map((ns, i) => ns / of(ours)[i])) })),
      ),
    };
  } finally {
    rmSync(folder, { recursive: true });
  }
}
