/** A path longer than this starts anew at the node's number: a chain of nodes can't make paths grow without bound. */
const LONGEST_PATH = 4096;
const LONGEST_NAME = 512;

/**
 * Paths by name: `~` and `/` escaped, `[n]` on every one of equal siblings, `#n` where nameless.
 *
 * @param parents index of each node's parent, -1 at a root; no node is its own ancestor
 */
export function nodePaths(names: readonly (string | undefined)[], parents: readonly number[]): string[] {
  const labels = siblingLabels(names, parents);
  const paths: string[] = [];
  const path = (index: number): string | undefined => paths[index];
  for (let start = 0; start < names.length; start++) {
    const way: number[] = [];
    for (let node = start; node !== -1 && path(node) === undefined; node = parents[node] ?? -1)
      way.push(node);
    for (let node = way.pop(); node !== undefined; node = way.pop()) {
      const above = path(parents[node] ?? -1);
      const label = labels[node] ?? `#${node}`;
      const full = above === undefined ? label : `${above}/${label}`;
      paths[node] = full.length > LONGEST_PATH ? `#${node}` : full;
    }
  }
  return paths;
}

function siblingLabels(names: readonly (string | undefined)[], parents: readonly number[]): string[] {
  const families = new Map<number, number[]>();
  parents.forEach((parent, index) => {
    const family = families.get(parent);
    if (family) family.push(index);
    else families.set(parent, [index]);
  });
  const labels: string[] = names.map((_, index) => `#${index}`);
  for (const family of families.values()) {
    const unique = uniqueLabels(
      family.map((index) => names[index] && escapeName(names[index])),
      (i) => `#${family[i]}`,
    );
    family.forEach((index, i) => (labels[index] = unique[i] ?? `#${index}`));
  }
  return labels;
}

function escapeName(name: string): string {
  const cut = name.length > LONGEST_NAME ? `${name.slice(0, LONGEST_NAME)}…` : name;
  return cut.replaceAll('~', '~0').replaceAll('/', '~1');
}

/**
 * One label each, no two alike: a name that stands alone is its own label, every one of equal names gets `[n]` in their
 * order, and a missing or empty name gets the number that `nameless` gives.
 */
export function uniqueLabels(
  names: readonly (string | undefined)[],
  nameless: (index: number) => string,
): string[] {
  const wanted = names.map((name, i) => name || nameless(i));
  const counts = new Map<string, number>();
  for (const label of wanted) counts.set(label, (counts.get(label) ?? 0) + 1);
  const taken = new Set(wanted.filter((label, i) => counts.get(label) === 1 || !names[i]));
  const next = new Map<string, number>();
  return wanted.map((label, i) => {
    if (counts.get(label) === 1 || !names[i]) return label;
    let n = next.get(label) ?? 0;
    while (taken.has(`${label}[${n}]`)) n++;
    next.set(label, n + 1);
    taken.add(`${label}[${n}]`);
    return `${label}[${n}]`;
  });
}
