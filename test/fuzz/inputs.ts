import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Inputs } from '../../src-core/analysis';
import { gatherInputs } from '../../src-core/inputs';
import type { FileContent, FilePath, Files } from '../../src-core/text/types';

/** The examples in memory; a text laid over stands for what is being typed. */
export function examples(root: string) {
  const texts = new Map<FilePath, string>();
  const walk = (folder: string, prefix: string) => {
    for (const entry of readdirSync(folder, { withFileTypes: true })) {
      if (entry.isDirectory()) walk(join(folder, entry.name), `${prefix}${entry.name}/`);
      else texts.set(prefix + entry.name, readFileSync(join(folder, entry.name), 'utf8'));
    }
  };
  walk(join(root, 'examples'), '');
  const filesWith = (file: FilePath, text: string): Files => ({
    read: async (wanted): Promise<FileContent> => {
      const found = wanted === file ? text : texts.get(wanted);
      return found === undefined ? { kind: 'missing' } : { kind: 'text', text: found };
    },
  });
  return {
    channels: [...texts.keys()].filter((file) => file.endsWith('.channel.yaml')).sort(),
    textOf: (file: FilePath) => texts.get(file) ?? '',
    inputs: (file: FilePath, text: string): Promise<Inputs> => gatherInputs(filesWith(file, text), file, '2026-12-01'),
  };
}
