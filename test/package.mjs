// `npm run package`: builds the extension's package and holds it to its size; then packs the command line.
import { readFileSync, statSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { run, setUp } from '../tasks.mjs';
import { makeCommandLinePackage } from './package-cli.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..');
/** design section 7 */
export const LIMIT_BYTES = 1.2 * 1000 * 1000;

/** Builds and packs. @returns the package's path; throws above the limit, with what is largest */
export async function makePackage({ build = true } = {}) {
  const metafiles = build ? await setUp() : [];
  const { version } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'));
  const file = join(root, 'dist', `lanewright-${version}.vsix`);
  const status = run(
    join(root, 'node_modules', '.bin', 'vsce'),
    [
      'package',
      '--no-dependencies',
      '--allow-missing-repository',
      '--no-rewrite-relative-links',
      '--skip-license',
      '--out',
      file,
    ],
    { stdio: ['ignore', 'ignore', 'inherit'] },
  );
  if (status !== 0) throw new Error('The package could not be made; the message is above.');
  const { size } = statSync(file);
  console.log(`${file}: ${(size / 1000).toFixed(0)} kB of ${(LIMIT_BYTES / 1000).toFixed(0)} kB`);
  if (size > LIMIT_BYTES) {
    for (const metafile of metafiles) {
      for (const [output, { bytes, inputs }] of Object.entries(metafile.outputs)) {
        const largest = Object.entries(inputs)
          .sort(([, a], [, b]) => b.bytesInOutput - a.bytesInOutput)
          .slice(0, 10);
        console.error(
          `${output} ${bytes}\n${largest.map(([input, part]) => `  ${part.bytesInOutput} ${input}`).join('\n')}`,
        );
      }
    }
    throw new Error('The package is larger than its limit.');
  }
  return file;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  try {
    await makePackage();
    console.log(makeCommandLinePackage());
  } catch (error) {
    console.error(error.message);
    process.exitCode = 1;
  }
}
