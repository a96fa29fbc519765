/** Prints a measured number beside the test that judges it. */
export function measured(line: string): void {
  console.log(line);
}
