// A Chromium that can be driven: the one on the path, else Debian's package where apt-get and root are at hand.
import { spawnSync } from 'node:child_process';
import { accessSync, constants } from 'node:fs';
import { delimiter, join } from 'node:path';

export const chromiumArguments = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--disable-features=LocalNetworkAccessChecks',
];

/** The path of an executable on PATH, or undefined. */
export function onPath(...names) {
  for (const name of names) {
    for (const folder of (process.env.PATH ?? '').split(delimiter)) {
      const file = join(folder, name);
      try {
        accessSync(file, constants.X_OK);
        return file;
      } catch {}
    }
  }
  return undefined;
}

const isRoot = () => process.getuid?.() === 0;

/** Installs Debian packages where that is possible; says whether it worked. */
export function installDebian(...packages) {
  if (!isRoot() || !onPath('apt-get')) return false;
  console.error(`Installing ${packages.join(', ')} …`);
  const environment = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const apt = (...args) =>
    spawnSync('apt-get', args, { stdio: ['ignore', 'ignore', 'inherit'], env: environment }).status === 0;
  return apt('update', '-q') && apt('install', '-y', '-q', '--no-install-recommends', ...packages);
}

export function findChromium() {
  const find = () => process.env.LANEWRIGHT_CHROMIUM ?? onPath('chromium', 'chromium-browser', 'google-chrome');
  const found = find() ?? (installDebian('chromium') ? find() : undefined);
  if (!found)
    throw new Error(
      'The editor tests need Chromium: install it (Debian: `apt-get install chromium`) or name it in LANEWRIGHT_CHROMIUM.',
    );
  return found;
}

/** A Python that has NumPy and YAML, for the independent recomputation. */
export function findPython() {
  const works = (command) => spawnSync(command, ['-c', 'import numpy, scipy, yaml'], { stdio: 'ignore' }).status === 0;
  const find = () => ['python3', '/usr/bin/python3'].find(works);
  const found = find() ?? (installDebian('python3-numpy', 'python3-scipy', 'python3-yaml') ? find() : undefined);
  if (!found)
    throw new Error(
      'The recomputation needs Python with NumPy, SciPy and YAML: `apt-get install python3-numpy python3-scipy python3-yaml`.',
    );
  return found;
}
