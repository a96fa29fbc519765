/** What the command sees of the world. */
export interface CommandIo {
  readonly stdout: { write(text: string): unknown; readonly isTTY?: boolean };
  readonly stderr: { write(text: string): unknown; readonly isTTY?: boolean };
  cwd(): string;
  /** Environment: `NO_COLOR` and `TERM` are looked at. */
  readonly env?: Readonly<Record<string, string | undefined>>;
  /** Asks the command to stop: long work ends, nothing is left half written. */
  readonly signal?: AbortSignal;
}
