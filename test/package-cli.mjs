// The command line as a package that another repository installs: one bundle, no dependencies. Part of `npm run package`.
import { copyFileSync, existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { run } from '../tasks.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..');

/** The bundle's first file and the chunks that it loads, now or later; `dist` may hold those of an older build too. */
function bundled(name = 'lanewright.mjs', found = new Set()) {
  if (found.has(name) || !existsSync(join(root, 'dist', name))) return found;
  found.add(name);
  const text = readFileSync(join(root, 'dist', name), 'utf8');
  for (const [chunk] of text.matchAll(/\b[\w-]+\.mjs/g)) bundled(chunk, found);
  return found;
}

/** Packs what was built. @returns the package's path, in `folder` */
export function makeCommandLinePackage(folder = join(root, 'dist')) {
  const { name, version, description, license, engines } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'));
  const staged = mkdtempSync(join(tmpdir(), 'lanewright-package-'));
  try {
    mkdirSync(join(staged, 'dist'));
    for (const file of bundled()) copyFileSync(join(root, 'dist', file), join(staged, 'dist', file));
    for (const file of ['LICENSE', 'README.md']) copyFileSync(join(root, file), join(staged, file));
    const manifest = {
      name,
      version,
      description,
      license,
      private: true,
      type: 'module',
      bin: { lanewright: 'dist/lanewright.mjs' },
      engines: { node: engines.node },
    };
    writeFileSync(join(staged, 'package.json'), `${JSON.stringify(manifest, null, 2)}\n`);
    const status = run('npm', ['pack', '--silent', '--pack-destination', folder], {
      cwd: staged,
      stdio: ['ignore', 'ignore', 'inherit'],
    });
    if (status !== 0) throw new Error('The command line could not be packed; the message is above.');
  } finally {
    rmSync(staged, { recursive: true, force: true });
  }
  return join(folder, `${name}-${version}.tgz`);
}
