// `npm test`: installs, builds and runs everything, the real editor included; ends with the line `N passed, M failed`.
import { spawn } from 'node:child_process';
import { mkdirSync, readFileSync, rmSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { setUp } from '../tasks.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..');
const results = join(root, 'test-results');

function run(command, args, environment = {}) {
  return new Promise((resolve) => {
    const child = spawn(command, args, {
      cwd: root,
      stdio: ['ignore', 'inherit', 'inherit'],
      env: { ...process.env, ...environment },
    });
    child.on('error', (error) => {
      console.error(error.message);
      resolve(1);
    });
    child.on('close', (code) => resolve(code ?? 1));
  });
}

const bin = (name) => join(root, 'node_modules', '.bin', name);

/** A step that is one test: it passes or it does not. */
const asOne = (title, command, args) => async () => {
  const passed = (await run(command, args)) === 0;
  console.log(`${passed ? 'ok' : 'FAILED'}: ${title}`);
  return passed ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 };
};

/** A step that writes `{ passed, failed }`; one that ends badly without saying why counts as a failure. */
const counted = (title, file, command, args, read) => async () => {
  const status = await run(command, args);
  let counts = { passed: 0, failed: 0 };
  try {
    counts = read(JSON.parse(readFileSync(join(results, file), 'utf8')));
  } catch {
    console.error(`${title}: no results were written.`);
    return { passed: 0, failed: 1 };
  }
  if (status !== 0 && counts.failed === 0) counts = { ...counts, failed: 1 };
  if (counts.passed + counts.failed === 0) counts = { passed: 0, failed: 1 };
  console.log(`${title}: ${counts.passed} passed, ${counts.failed} failed`);
  return counts;
};

async function main() {
  rmSync(results, { recursive: true, force: true });
  mkdirSync(results, { recursive: true });
  await setUp({ tests: true });
  const { findChromium, findPython } = await import('./editor/chromium.mjs');
  process.env.LANEWRIGHT_CHROMIUM = findChromium();
  process.env.LANEWRIGHT_PYTHON = findPython();

  const steps = [
    asOne('format and lint', bin('biome'), ['check', '--error-on-warnings', '.']),
    asOne('types', bin('tsc'), ['--noEmit', '-p', '.']),
    asOne('generated references are fresh', process.execPath, ['schemas/build.mjs', '--check']),
    counted(
      'unit, protocol, command line, preview',
      'vitest.json',
      bin('vitest'),
      ['run', '--reporter=default', '--reporter=json', '--outputFile.json=test-results/vitest.json'],
      (json) => ({
        passed: json.numPassedTests,
        failed: json.numFailedTests + (json.numFailedTestSuites && !json.numFailedTests ? json.numFailedTestSuites : 0),
      }),
    ),
    counted('real editor', 'editor.json', process.execPath, ['test/editor/run.mjs'], (json) => json),
  ];
  let passed = 0;
  let failed = 0;
  for (const step of steps) {
    const counts = await step();
    passed += counts.passed;
    failed += counts.failed;
  }
  console.log(`\n${passed} passed, ${failed} failed`);
  process.exitCode = failed > 0 ? 1 : 0;
}

main().catch((error) => {
  console.error(error instanceof Error ? error.message : error);
  console.log('\n0 passed, 1 failed');
  process.exitCode = 1;
});
