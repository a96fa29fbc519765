/** Runs the command. Gives the exit code. */
export async function main(
  argv: readonly string[],
  io: { stderr: { write(text: string): unknown } },
): Promise<number> {
  io.stderr.write(`slewcurve: nothing built yet (${argv.join(' ')})\n`);
  return 2;
}
