/** What an error says, whatever was thrown. */
export function messageOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}

/** The system's own word for a failed call: `ENOENT`, `EEXIST`. */
export function systemCode(error: unknown): string | undefined {
  const holds = typeof error === 'object' && error !== null && 'code' in error;
  return holds && typeof error.code === 'string' ? error.code : undefined;
}
