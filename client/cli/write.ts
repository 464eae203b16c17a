import { rename, rm, writeFile } from 'node:fs/promises';
import { Refusal } from './command';

/** Writes beside the file and renames: a failure or an interrupt leaves the old file or the new one, never half. @throws Refusal */
export async function writeAtomically(path: string, content: string): Promise<void> {
  const beside = `${path}.${process.pid}.tmp`;
  try {
    await writeFile(beside, content);
    await rename(beside, path);
  } catch (error) {
    await rm(beside, { force: true });
    throw new Refusal(`\`${path}\` could not be written: ${(error as Error).message}`);
  }
}
