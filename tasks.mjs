// What one types on a fresh machine: `npm run demo`, `npm start`; and `npm run references`. Needs Node alone; installs and builds what is missing.
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';

const here = dirname(fileURLToPath(import.meta.url));
const stamp = join(here, 'node_modules', '.lanewright-lock');

export function run(command, args, options = {}) {
  const { status, error } = spawnSync(command, args, { cwd: here, stdio: 'inherit', ...options });
  if (error) throw error;
  return status ?? 1;
}

/** Installs the locked packages if they are missing or the lock file changed. */
export function install() {
  const lock = createHash('sha256')
    .update(readFileSync(join(here, 'package-lock.json')))
    .digest('hex');
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === lock) return;
  console.error('Installing packages …');
  if (run('npm', ['ci', '--no-audit', '--no-fund', '--loglevel=error']) !== 0)
    throw new Error('`npm ci` failed; its output is above.');
  writeFileSync(stamp, lock);
}

/** Installs and builds. Everything else that is typed goes through here. */
export async function setUp({ tests = false } = {}) {
  install();
  console.error('Building …');
  const { buildAll } = await import('./build.mjs');
  return buildAll({ tests });
}

const lanewright = (...args) => run(process.execPath, [join(here, 'dist', 'lanewright.mjs'), ...args]);

async function demo() {
  await setUp();
  console.log('\nThe channels of an invented fruit-sorting machine. Some are meant to fail:\n');
  const status = lanewright('check', 'examples');
  if (status === 2) throw new Error('`lanewright check` could not be carried out; its message is above.');
  mkdirSync(join(here, 'dist', 'demo'), { recursive: true });
  const report = join(here, 'dist', 'demo', 'camera-sled.html');
  if (lanewright('report', 'examples/lanes/camera-sled.channel.yaml', '--format', 'html', '--output', report) > 1)
    throw new Error('The report could not be written.');
  console.log(`\nReport with pictures: ${report}`);
}

async function start() {
  await setUp();
  const { openExamples } = await import('./test/editor/open.mjs');
  await openExamples();
}

/** Writes what is generated and committed: the schemas and the format's reference, then the rules' reference. */
async function references() {
  const { bundleForNode } = await import('./build.mjs');
  const { buildSchemas } = await import('./schemas/build.mjs');
  await buildSchemas();
  const bundle = join(here, 'dist', 'test', 'rules-reference.mjs');
  await bundleForNode('src-core/rules/build.ts', bundle);
  const { rulesReference } = await import(pathToFileURL(bundle).href);
  writeFileSync(join(here, 'src-core', 'rules', 'README.md'), rulesReference());
}

const tasks = { demo, start, references, install: async () => install(), setup: () => setUp() };
if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const task = tasks[process.argv[2]];
  if (!task) {
    console.error(`Usage: node tasks.mjs ${Object.keys(tasks).join('|')}`);
    process.exitCode = 2;
  } else {
    await task().catch((error) => {
      console.error(error instanceof Error ? error.message : error);
      process.exitCode = 2;
    });
  }
}
