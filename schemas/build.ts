import { existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { plain } from './build/plain';
import { publishedSchemas } from './build/published';
import { formatReference } from './build/reference';
import { formatModule, formatTypes } from './build/runtime';
import { validatorsModule, validatorsTypes } from './build/validators';
import { checkOutput } from './outputs/check';
import { reviewOutput } from './outputs/review';

/** Committed files, by name. */
function committed(folder: string): Record<string, string> {
  const meanings = readFileSync(`${folder}format/meanings.md`, 'utf8');
  const files: Record<string, string> = { 'README.md': formatReference(meanings) };
  for (const [name, schema] of Object.entries(publishedSchemas())) {
    files[`${name}.schema.json`] = `${JSON.stringify(schema, null, 2)}\n`;
  }
  for (const [name, schema] of Object.entries({ 'check-output': checkOutput, 'review-output': reviewOutput })) {
    const output = {
      $schema: 'https://json-schema.org/draft/2020-12/schema',
      $id: `urn:lanewright:schema:1:${name}`,
      ...plain(schema),
    };
    files[`${name}.schema.json`] = `${JSON.stringify(output, null, 2)}\n`;
  }
  return files;
}

async function generated(): Promise<Record<string, string>> {
  return {
    'generated/validators.js': await validatorsModule(),
    'generated/validators.d.ts': validatorsTypes(),
    'generated/format.js': formatModule(),
    'generated/format.d.ts': formatTypes(),
  };
}

/** Replaced in one step, so that a build running beside this one never reads half a file. */
function replaceFile(path: string, text: string) {
  const fresh = `${path}.${process.pid}`;
  writeFileSync(fresh, text);
  renameSync(fresh, path);
}

/**
 * Writes what changed, or with `check` only compares the committed files.
 * @param folder `schemas/`, with a slash at its end
 * @returns with `check` the names of the stale files; else none
 */
export async function run(folder: string, { check }: { check: boolean }): Promise<string[]> {
  const files = check ? committed(folder) : { ...committed(folder), ...(await generated()) };
  const changed = Object.entries(files).filter(
    ([name, text]) => !existsSync(folder + name) || readFileSync(folder + name, 'utf8') !== text,
  );
  if (check) return changed.map(([name]) => name);
  mkdirSync(`${folder}generated`, { recursive: true });
  const made = Object.keys(files).filter((name) => name.startsWith('generated/')); // always: their age says that they are fresh
  for (const name of new Set([...changed.map(([changedName]) => changedName), ...made]))
    replaceFile(folder + name, files[name]);
  return [];
}
