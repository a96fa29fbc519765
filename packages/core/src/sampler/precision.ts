/** How a sampler is compiled. */
export interface SamplerOptions {
  /**
   * `float64` (default): within 1e-13 degrees of the exact curve. `float32`: within 2e-5 degrees, about what storing the result in
   * float32 costs, in half the memory and a little less time. Great arcs alone know the difference; CUBICSPLINE and STEP tracks
   * are float64 either way.
   */
  readonly precision?: 'float64' | 'float32';
}
