import type { FileContent, FilePath, Files } from './text/types';

/** The few operations on a disk that reading needs; Node's are given by the server and the command line. */
export interface Disk {
  readonly separator: '/' | '\\';
  /** The path with every link followed; undefined if there is nothing. */
  realPath(path: string): Promise<string | undefined>;
  /** undefined if there is nothing. `other`: folder, device, pipe, socket. */
  status(path: string): Promise<{ readonly kind: 'file' | 'other'; readonly bytes: number } | undefined>;
  readText(path: string): Promise<string>;
}

/** design section 8 */
const MEBIBYTE = 1024 * 1024;
export const YAML_LIMIT_BYTES = MEBIBYTE;
export const TOUCHSTONE_LIMIT_BYTES = 64 * MEBIBYTE;

/**
 * Reads files below `root` and nothing else: what a link leads out of it to, devices and pipes are refused unread, and what is
 * too large is refused by its size alone.
 * @param root absolute path of the folder that is open
 */
export function sandboxedFiles(root: string, disk: Disk): Files {
  const { separator } = disk;
  const realRoot = disk.realPath(root);
  const inside = (path: string, folder: string) =>
    path === folder || path.startsWith(folder.endsWith(separator) ? folder : folder + separator);

  return {
    async read(file: FilePath): Promise<FileContent> {
      const steps = file.split('/');
      if (
        file === '' ||
        steps.some(
          (step) => step === '' || step === '.' || step === '..' || step.includes('\0') || step.includes(separator),
        )
      ) {
        return { kind: 'refused', reason: 'its path is none inside the folder that is open' };
      }
      const folder = await realRoot;
      if (folder === undefined) return { kind: 'missing' };
      const path = root + (root.endsWith(separator) ? '' : separator) + steps.join(separator);
      const real = await disk.realPath(path);
      if (real === undefined) return { kind: 'missing' };
      if (!inside(real, folder))
        return {
          kind: 'refused',
          reason: 'it is a link that leads out of the folder that is open',
        };
      const status = await disk.status(real);
      if (!status) return { kind: 'missing' };
      if (status.kind !== 'file') return { kind: 'refused', reason: 'it is not a file' };
      const limit = /\.s\d+p$/i.test(file) ? TOUCHSTONE_LIMIT_BYTES : YAML_LIMIT_BYTES;
      if (status.bytes > limit) return { kind: 'too-large', bytes: status.bytes, limit };
      return { kind: 'text', text: await disk.readText(real) };
    },
  };
}
