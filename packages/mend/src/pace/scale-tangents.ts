/** Scales what leaves and enters each segment by how much faster it runs now, so that it plays the same path. */
export function scaleTangents(values: Float64Array, olds: Float64Array, news: Float64Array): void {
  for (let key = 0; key + 1 < news.length; key++) {
    const scale = (olds[key + 1] - olds[key]) / (news[key + 1] - news[key]);
    if (scale === 1) continue;
    for (let i = 0; i < 4; i++) {
      values[12 * key + 8 + i] *= scale;
      values[12 * (key + 1) + i] *= scale;
    }
  }
}
