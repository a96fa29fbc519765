/** Discrete Fourier transform in place: Σ z·e^(−2πikn/count) of complex numbers, real parts and imaginary ones. */
export type Fourier = (real: Float64Array, imaginary: Float64Array) => void;

/**
 * The transform of `count` numbers, any `count`: by its prime factors, in the self-sorting order of T. G. Stockham (1966; the
 * form for any factor is common practice). Costs `count` times the sum of the factors. Scratch is shared by all calls.
 */
export function fourier(count: number): Fourier {
  const cosines = Float64Array.from({ length: count }, (_, n) => Math.cos((2 * Math.PI * n) / count));
  const sines = Float64Array.from({ length: count }, (_, n) => -Math.sin((2 * Math.PI * n) / count));
  const spare = [new Float64Array(count), new Float64Array(count)] as const;
  const factors = primeFactors(count);
  return (real, imaginary) => {
    let [re, im]: readonly [Float64Array, Float64Array] = [real, imaginary];
    let [toRe, toIm]: readonly [Float64Array, Float64Array] = spare;
    let stride = 1;
    for (const factor of factors) {
      pass(re, im, toRe, toIm, cosines, sines, factor, stride);
      stride *= factor;
      [re, im, toRe, toIm] = [toRe, toIm, re, im];
    }
    if (re === real) return;
    real.set(re);
    imaginary.set(im);
  };
}

/** One factor's share of the transform. */
function pass(
  re: Float64Array,
  im: Float64Array,
  toRe: Float64Array,
  toIm: Float64Array,
  cosines: Float64Array,
  sines: Float64Array,
  factor: number,
  stride: number,
): void {
  const count = re.length;
  const groups = count / stride / factor;
  const root = count / factor;
  for (let group = 0; group < groups; group++)
    for (let out = 0; out < factor; out++) {
      const twist = group * out * stride;
      for (let k = 0; k < stride; k++) {
        let x = 0;
        let y = 0;
        // The angle of e^(−2πi(out·j/factor + group·out·stride/count)), in parts of `count`.
        for (let j = 0, turn = twist; j < factor; j++, turn += out * root) {
          if (turn >= count) turn -= count;
          const at = k + stride * (group + groups * j);
          x += cosines[turn]! * re[at]! - sines[turn]! * im[at]!;
          y += cosines[turn]! * im[at]! + sines[turn]! * re[at]!;
        }
        toRe[k + stride * (factor * group + out)] = x;
        toIm[k + stride * (factor * group + out)] = y;
      }
    }
}

function primeFactors(count: number): number[] {
  const factors: number[] = [];
  let left = count;
  for (let factor = 2; factor * factor <= left; factor++)
    while (left % factor === 0) {
      factors.push(factor);
      left /= factor;
    }
  if (left > 1) factors.push(left);
  return factors;
}
