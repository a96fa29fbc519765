/** What the system's codes mean, for people who never met them. */
const MEANINGS: Readonly<Record<string, string>> = {
  EACCES: 'that is not allowed here',
  EBUSY: 'something else is using it',
  EISDIR: 'it is a folder',
  ELOOP: 'its links lead round in a circle',
  EMFILE: 'too many files are open at once',
  ENAMETOOLONG: 'its name is too long',
  ENOENT: 'there is no such file or folder',
  ENOSPC: 'the disk is full',
  ENOTDIR: 'a part of its path is no folder',
  EPERM: 'that is not allowed here',
  EROFS: 'the disk can only be read',
};

/** What an error says, whatever was thrown; the system's own in words. */
export function messageOf(error: unknown): string {
  const meaning = MEANINGS[systemCode(error) ?? ''];
  return meaning ?? (error instanceof Error ? error.message : String(error));
}

/** The system's own word for a failed call: `ENOENT`, `EEXIST`. */
export function systemCode(error: unknown): string | undefined {
  const holds = typeof error === 'object' && error !== null && 'code' in error;
  return holds && typeof error.code === 'string' ? error.code : undefined;
}
