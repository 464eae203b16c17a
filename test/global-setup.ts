import { existsSync, readdirSync, statSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

const schemas = fileURLToPath(new URL('../schemas/', import.meta.url));
const changedAt = (path: string) => (existsSync(path) ? statSync(path).mtimeMs : 0);

/** Unit tests read the compiled validators, which are not committed: they are made where they are missing or older than the format. */
export default async function setup() {
  const oldest = Math.min(...['validators.js', 'format.js'].map((file) => changedAt(`${schemas}generated/${file}`)));
  const sources = ['format', 'build'].flatMap((folder) =>
    readdirSync(schemas + folder, { recursive: true, encoding: 'utf8' }).map((file) => `${schemas}${folder}/${file}`),
  );
  if (oldest > 0 && sources.every((file) => changedAt(file) <= oldest)) return;
  // @ts-expect-error a plain script without types
  const { buildSchemas } = await import('../schemas/build.mjs');
  await buildSchemas();
}
