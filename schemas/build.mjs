/**
 * Writes the published schemas, the format reference, and what the product needs of them at run time.
 * `node schemas/build.mjs` writes; `--check` writes nothing and ends with status 1 if a committed file is stale.
 */
import { mkdirSync, rmSync } from 'node:fs';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build } from 'esbuild';

const folder = fileURLToPath(new URL('.', import.meta.url));

export async function buildSchemas({ check = false } = {}) {
  const bundle = `${folder}generated/.build-${process.pid}.mjs`;
  mkdirSync(`${folder}generated`, { recursive: true });
  try {
    await build({
      entryPoints: [`${folder}build.ts`],
      outfile: bundle,
      bundle: true,
      platform: 'node',
      format: 'esm',
      packages: 'external',
      logLevel: 'warning',
    });
    const { run } = await import(pathToFileURL(bundle).href);
    return await run(folder, { check });
  } finally {
    rmSync(bundle, { force: true });
  }
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const stale = await buildSchemas({ check: process.argv.includes('--check') });
  for (const file of stale) console.error(`schemas/${file} is stale: run \`node schemas/build.mjs\` and commit the result.`);
  process.exitCode = stale.length > 0 ? 1 : 0;
}
