import { multiply, type ReadonlyNumberStore } from '@slewcurve/core';

/** The product of orientations from left to right: the last turn first. */
export function multiplyAll(...quats: readonly ReadonlyNumberStore[]): number[] {
  const product = [0, 0, 0, 1];
  for (const q of quats) multiply(product, product, q);
  return product;
}
