/** What each node's value counts for in the polynomial through all nodes, and in its derivative, at one time. */
export interface PolynomialWeights {
  readonly value: Float64Array;
  /** Per second. */
  readonly slope: Float64Array;
}

/**
 * Lagrange's weights at `time` of the polynomial through values at `nodes` (seconds, all different). For nodes at −2, −1, 1 and 2 gaps
 * from `time` the values' are −1/6, 4/6, 4/6, −1/6.
 */
export function polynomialWeights(nodes: readonly number[], time: number): PolynomialWeights {
  const value = new Float64Array(nodes.length);
  const slope = new Float64Array(nodes.length);
  for (let node = 0; node < nodes.length; node++) {
    value[node] = product(nodes, time, node, -1);
    for (let left = 0; left < nodes.length; left++)
      if (left !== node) slope[node] += product(nodes, time, node, left) / (nodes[node] - nodes[left]);
  }
  return { value, slope };
}

/** Π (t − t_i)/(t_node − t_i) over all i but `node` and `left`. */
function product(nodes: readonly number[], time: number, node: number, left: number): number {
  let all = 1;
  for (let i = 0; i < nodes.length; i++)
    if (i !== node && i !== left) all *= (time - nodes[i]) / (nodes[node] - nodes[i]);
  return all;
}
