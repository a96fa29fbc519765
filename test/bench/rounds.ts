/** One way of doing a case's work. `run` does the whole batch once and gives a checksum of what it made. */
export interface Contender {
  readonly name: string;
  run(): number;
}

export interface BenchCase {
  readonly id: string;
  readonly title: string;
  /** What `items` counts. */
  readonly unit: 'slerp' | 'sample' | 'joint' | 'squad';
  /** Items in one batch. */
  readonly items: number;
  readonly contenders: readonly Contender[];
  /** Pairs whose ratio of times (the second over the first) is reported: how many times as fast the first is. */
  readonly pairs: readonly (readonly [ours: string, peer: string])[];
}

/** Median and the 10th and 90th hundredth. */
interface Spread {
  readonly median: number;
  readonly p10: number;
  readonly p90: number;
}

export interface CaseResult {
  readonly id: string;
  readonly title: string;
  readonly unit: BenchCase['unit'];
  readonly contenders: readonly {
    readonly name: string;
    /** CPU time an item, nanoseconds: depends on the machine and its load; the ratios hardly do. */
    readonly nanoseconds: Spread;
    readonly checksum: number;
  }[];
  readonly pairs: readonly { readonly ours: string; readonly peer: string; readonly speedUp: Spread }[];
}

const WARM_UP = 6;
/** CPU time of one contender in one round, microseconds: well over the clock's step. */
const TURN = 4000;

/**
 * Every round runs every contender once, in a new random order, and forms its own ratios; CPU time, not wall time, since a busy
 * neighbour moves the latter up to threefold.
 */
export function measureCase(bench: BenchCase, rounds: number, random: () => number): CaseResult {
  const { contenders, items } = bench;
  const repeats = contenders.map((contender) =>
    Math.max(1, Math.ceil(TURN / cpuMicroseconds(contender, 3).each)),
  );
  const times: number[][] = [];
  let checksums: number[] = [];
  for (let round = -WARM_UP; round < rounds; round++) {
    const row: number[] = [];
    checksums = [];
    for (const i of shuffled(contenders.length, random)) {
      const { each, checksum } = cpuMicroseconds(contenders[i], repeats[i]);
      row[i] = (each * 1000) / items;
      checksums[i] = checksum;
    }
    if (round >= 0) times.push(row);
  }
  const index = (name: string): number => contenders.findIndex((contender) => contender.name === name);
  return {
    id: bench.id,
    title: bench.title,
    unit: bench.unit,
    contenders: contenders.map(({ name }, i) => ({
      name,
      nanoseconds: spread(times.map((row) => row[i])),
      checksum: checksums[i],
    })),
    pairs: bench.pairs
      .filter(([ours, peer]) => index(ours) >= 0 && index(peer) >= 0)
      .map(([ours, peer]) => ({
        ours,
        peer,
        speedUp: spread(times.map((row) => row[index(peer)] / row[index(ours)])),
      })),
  };
}

export function cpuMicroseconds(contender: Contender, repeats: number): { each: number; checksum: number } {
  let checksum = 0;
  const before = process.cpuUsage();
  for (let i = 0; i < repeats; i++) checksum = contender.run();
  const { user, system } = process.cpuUsage(before);
  return { each: Math.max(1, user + system) / repeats, checksum };
}

function shuffled(length: number, random: () => number): number[] {
  const order = Array.from({ length }, (_, i) => i);
  for (let i = length - 1; i > 0; i--) {
    const j = Math.floor(random() * (i + 1));
    [order[i], order[j]] = [order[j], order[i]];
  }
  return order;
}

export function spread(values: readonly number[]): Spread {
  const sorted = values.toSorted((a, b) => a - b);
  const at = (part: number): number => sorted[Math.round(part * (sorted.length - 1))];
  return { median: at(0.5), p10: at(0.1), p90: at(0.9) };
}
