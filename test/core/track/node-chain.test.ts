import { nodeChain } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';

describe('the chain of a node', () => {
  test('leads from the node to its root, whatever order the nodes are listed in', () => {
    expect(nodeChain([{ parent: 2 }, { parent: 0 }, { parent: -1 }], 1)).toEqual([1, 0, 2]);
    expect(nodeChain([{ parent: -1 }], 0)).toEqual([0]);
  });

  test('of no node is empty', () => {
    expect(nodeChain([], 0)).toEqual([]);
    expect(nodeChain([{ parent: -1 }], -1)).toEqual([]);
  });

  test('ends in rings and at parents that are not there, and holds no node twice', () => {
    expect(nodeChain([{ parent: 1 }, { parent: 0 }], 0)).toEqual([0, 1]);
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -2, max: 12 }), { minLength: 1, maxLength: 10 }), (parents) => {
        const chain = nodeChain(
          parents.map((parent) => ({ parent })),
          0,
        );
        expect(new Set(chain).size).toBe(chain.length);
        chain.slice(1).forEach((node, i) => expect(node).toBe(parents[chain[i]]));
      }),
      { seed: 4 },
    );
  });
});
