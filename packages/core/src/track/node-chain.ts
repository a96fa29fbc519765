import type { SceneNode } from './clip.js';

/** Numbers of a node and of all above it, up to its root. A ring of parents ends where it would begin again. Never throws. */
export function nodeChain(nodes: readonly Pick<SceneNode, 'parent'>[], node: number): readonly number[] {
  const chain = new Set<number>();
  for (let at = node; at in nodes && !chain.has(at); at = nodes[at].parent) chain.add(at);
  return [...chain];
}
