/** Amplitude of the line at `hertz` in evenly spaced numbers, by the discrete Fourier sum as textbooks have it: 2/n·|Σ x·e^(−2πift)|. */
export function lineAt(numbers: readonly number[], rate: number, hertz: number): number {
  let [real, imaginary] = [0, 0];
  numbers.forEach((x, n) => {
    real += x * Math.cos((2 * Math.PI * hertz * n) / rate);
    imaginary -= x * Math.sin((2 * Math.PI * hertz * n) / rate);
  });
  return (2 / numbers.length) * Math.hypot(real, imaginary);
}

/** Mean of the squares. */
export function power(numbers: readonly number[]): number {
  return numbers.reduce((sum, x) => sum + x * x, 0) / numbers.length;
}

/** By how many decibels a power lies above another. */
export function decibels(of: number, against: number): number {
  return 10 * Math.log10(of / against);
}
