import { dirname, join } from 'node:path';
import { fileSource, type FileSource } from './file-source.js';

/** The files that stand beside a file and that it refers to by relative URI. */
export interface Siblings {
  open(uri: string): Promise<FileSource>;
  /** URIs that were opened. */
  readonly opened: readonly string[];
  close(): Promise<void>;
}

/** Siblings of the file at `path`. The caller (`openAnimation`) has refused URIs that climb out of the folder. */
export function siblingsOf(path: string): Siblings {
  const opened = new Map<string, FileSource>();
  return {
    get opened() {
      return [...opened.keys()];
    },
    async open(uri) {
      const known = opened.get(uri);
      if (known) return known;
      const source = await fileSource(join(dirname(path), uri));
      opened.set(uri, source);
      return source;
    },
    async close() {
      await Promise.all([...opened.values()].map((source) => source.close()));
    },
  };
}
