import { existsSync } from 'node:fs';

/** Unit tests read the compiled validators, which are not committed: they are made where they are missing. */
export default async function setup() {
  const generated = ['validators.js', 'format.js'].map(
    (file) => new URL(`../schemas/generated/${file}`, import.meta.url),
  );
  if (generated.every((file) => existsSync(file))) return;
  // @ts-expect-error a plain script without types
  const { buildSchemas } = await import('../schemas/build.mjs');
  await buildSchemas();
}
