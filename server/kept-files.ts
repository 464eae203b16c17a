import type { FileContent, FilePath } from '../src-core/text/types';
import type { RootFiles } from './files';

/** Most characters kept of files that are not open. */
const MOST_KEPT = 64 * 1024 * 1024;

export interface KeptFiles extends RootFiles {
  /** What was read of it counts no more. */
  forget(file: FilePath): void;
  forgetAll(): void;
}

/**
 * Remembers what was read until someone says that it changed, so that a key stroke reads no disk.
 * @param lifetime milliseconds after which it is read again all the same: for clients that cannot watch files
 */
export function keepFiles(files: RootFiles, now: () => number, lifetime: () => number): KeptFiles {
  const kept = new Map<FilePath, { content: Promise<FileContent>; size: number; since: number }>();
  let total = 0;
  const forget = (file: FilePath) => {
    total -= kept.get(file)?.size ?? 0;
    kept.delete(file);
  };
  return {
    read(file) {
      const known = kept.get(file);
      if (known && now() - known.since <= lifetime()) return known.content;
      forget(file);
      const entry = { content: files.read(file), size: 0, since: now() };
      kept.set(file, entry);
      entry.content.then(
        (content) => {
          if (kept.get(file) !== entry || content.kind !== 'text') return;
          entry.size = content.text.length;
          total += entry.size;
          for (const oldest of kept.keys()) {
            if (total <= MOST_KEPT || oldest === file) break;
            forget(oldest);
          }
        },
        () => forget(file),
      );
      return entry.content;
    },
    list: (folder) => files.list(folder),
    forget,
    forgetAll() {
      kept.clear();
      total = 0;
    },
  };
}
