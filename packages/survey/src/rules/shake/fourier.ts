/** Discrete Fourier transform in place: Σ z·e^(−2πikn/count) of complex numbers, real parts and imaginary ones. */
export type Fourier = (real: Float64Array, imaginary: Float64Array) => void;

/** Complex numbers, and the unit circle in as many parts: e^(−2πin/count). */
interface Complex {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/**
 * The transform of `count` numbers, any `count`: by its factors, in the self-sorting order of T. G. Stockham (1966; the form for any
 * factor, and the short ones of 3, 4 and 5 numbers, are common practice). Costs `count` times the sum of the factors, less for 3, 4 and 5,
 * which windows of even clocks are made of. Scratch is shared by all calls.
 */
export function fourier(count: number): Fourier {
  const circle: Complex = {
    re: Float64Array.from({ length: count }, (_, n) => Math.cos((2 * Math.PI * n) / count)),
    im: Float64Array.from({ length: count }, (_, n) => -Math.sin((2 * Math.PI * n) / count)),
  };
  const spare: Complex = { re: new Float64Array(count), im: new Float64Array(count) };
  const factors = factorsOf(count);
  return (real, imaginary) => {
    const given: Complex = { re: real, im: imaginary };
    let [from, to] = [given, spare];
    let stride = 1;
    for (const factor of factors) {
      if (factor === 4) passOfFour(from, to, circle, stride);
      else if (factor === 3) passOfThree(from, to, circle, stride);
      else if (factor === 5) passOfFive(from, to, circle, stride);
      else passOf(factor, from, to, circle, stride);
      stride *= factor;
      [from, to] = [to, from];
    }
    if (from === given) return;
    real.set(from.re);
    imaginary.set(from.im);
  };
}

/**
 * One factor's share of the transform: `factor` numbers that lie `count / factor` apart are transformed among themselves, and each result,
 * `out` of group `group`, is turned by e^(−2πi·group·out·stride/count).
 */
function passOf(factor: number, { re, im }: Complex, to: Complex, circle: Complex, stride: number): void {
  const count = re.length;
  const apart = count / factor;
  for (let first = 0; first < apart; first += stride)
    for (let out = 0; out < factor; out++)
      for (let k = 0; k < stride; k++) {
        let x = 0;
        let y = 0;
        // The angle of e^(−2πi(out·j/factor + group·out·stride/count)), in parts of `count`.
        for (let j = 0, turn = first * out; j < factor; j++, turn += out * apart) {
          if (turn >= count) turn -= count;
          const at = first + k + apart * j;
          x += circle.re[turn]! * re[at]! - circle.im[turn]! * im[at]!;
          y += circle.re[turn]! * im[at]! + circle.im[turn]! * re[at]!;
        }
        to.re[k + factor * first + stride * out] = x;
        to.im[k + factor * first + stride * out] = y;
      }
}

/** Writes x + iy, turned by a part of the circle. */
function put({ re, im }: Complex, at: number, x: number, y: number, circle: Complex, turn: number): void {
  const c = circle.re[turn]!;
  const s = circle.im[turn]!;
  re[at] = c * x - s * y;
  im[at] = c * y + s * x;
}

function passOfThree({ re, im }: Complex, to: Complex, circle: Complex, stride: number): void {
  const apart = re.length / 3;
  const sine = Math.sqrt(3) / 2;
  for (let first = 0; first < apart; first += stride)
    for (let k = 0; k < stride; k++) {
      const a = first + k;
      const b = a + apart;
      const c = a + 2 * apart;
      const sumX = re[b]! + re[c]!;
      const sumY = im[b]! + im[c]!;
      const apartX = sine * (re[b]! - re[c]!);
      const apartY = sine * (im[b]! - im[c]!);
      const midX = re[a]! - sumX / 2;
      const midY = im[a]! - sumY / 2;
      const at = 3 * first + k;
      to.re[at] = re[a]! + sumX;
      to.im[at] = im[a]! + sumY;
      put(to, at + stride, midX + apartY, midY - apartX, circle, first);
      put(to, at + 2 * stride, midX - apartY, midY + apartX, circle, 2 * first);
    }
}

function passOfFour({ re, im }: Complex, to: Complex, circle: Complex, stride: number): void {
  const apart = re.length / 4;
  for (let first = 0; first < apart; first += stride)
    for (let k = 0; k < stride; k++) {
      const a = first + k;
      const b = a + apart;
      const c = a + 2 * apart;
      const d = a + 3 * apart;
      const evenX = re[a]! + re[c]!;
      const evenY = im[a]! + im[c]!;
      const oddX = re[b]! + re[d]!;
      const oddY = im[b]! + im[d]!;
      const evenApartX = re[a]! - re[c]!;
      const evenApartY = im[a]! - im[c]!;
      const oddApartX = re[b]! - re[d]!;
      const oddApartY = im[b]! - im[d]!;
      const at = 4 * first + k;
      to.re[at] = evenX + oddX;
      to.im[at] = evenY + oddY;
      put(to, at + stride, evenApartX + oddApartY, evenApartY - oddApartX, circle, first);
      put(to, at + 2 * stride, evenX - oddX, evenY - oddY, circle, 2 * first);
      put(to, at + 3 * stride, evenApartX - oddApartY, evenApartY + oddApartX, circle, 3 * first);
    }
}

const [C1, C2] = [Math.cos((2 * Math.PI) / 5), Math.cos((4 * Math.PI) / 5)];
const [S1, S2] = [Math.sin((2 * Math.PI) / 5), Math.sin((4 * Math.PI) / 5)];

function passOfFive({ re, im }: Complex, to: Complex, circle: Complex, stride: number): void {
  const apart = re.length / 5;
  for (let first = 0; first < apart; first += stride)
    for (let k = 0; k < stride; k++) {
      const a = first + k;
      const b = a + apart;
      const c = a + 2 * apart;
      const d = a + 3 * apart;
      const e = a + 4 * apart;
      const x1 = re[b]! + re[e]!;
      const y1 = im[b]! + im[e]!;
      const dx1 = re[b]! - re[e]!;
      const dy1 = im[b]! - im[e]!;
      const x2 = re[c]! + re[d]!;
      const y2 = im[c]! + im[d]!;
      const dx2 = re[c]! - re[d]!;
      const dy2 = im[c]! - im[d]!;
      const evenX1 = re[a]! + C1 * x1 + C2 * x2;
      const evenY1 = im[a]! + C1 * y1 + C2 * y2;
      const evenX2 = re[a]! + C2 * x1 + C1 * x2;
      const evenY2 = im[a]! + C2 * y1 + C1 * y2;
      const oddX1 = S1 * dx1 + S2 * dx2;
      const oddY1 = S1 * dy1 + S2 * dy2;
      const oddX2 = S2 * dx1 - S1 * dx2;
      const oddY2 = S2 * dy1 - S1 * dy2;
      const at = 5 * first + k;
      to.re[at] = re[a]! + x1 + x2;
      to.im[at] = im[a]! + y1 + y2;
      put(to, at + stride, evenX1 + oddY1, evenY1 - oddX1, circle, first);
      put(to, at + 2 * stride, evenX2 + oddY2, evenY2 - oddX2, circle, 2 * first);
      put(to, at + 3 * stride, evenX2 - oddY2, evenY2 + oddX2, circle, 3 * first);
      put(to, at + 4 * stride, evenX1 - oddY1, evenY1 + oddX1, circle, 4 * first);
    }
}

/** Fours first, then primes. */
function factorsOf(count: number): number[] {
  const factors: number[] = [];
  let left = count;
  for (; left % 4 === 0; left /= 4) factors.push(4);
  for (let factor = 2; factor * factor <= left; factor++)
    for (; left % factor === 0; left /= factor) factors.push(factor);
  if (left > 1) factors.push(left);
  return factors;
}
