/** What the command sees of the world; `process` fits. */
export interface CommandIo {
  readonly stdout: { write(text: string): unknown };
  readonly stderr: { write(text: string): unknown; readonly isTTY?: boolean };
  cwd(): string;
}
