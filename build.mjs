// Builds everything that ships, and with --tests what the editor's suites load. Used by every other script.

import { cpSync, existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const here = dirname(fileURLToPath(import.meta.url));
const at = (path) => join(here, path);
const { version } = JSON.parse(readFileSync(at('package.json'), 'utf8'));

const common = {
  absWorkingDir: here,
  bundle: true,
  minify: true,
  legalComments: 'none',
  target: 'es2022',
  define: { LANEWRIGHT_VERSION: JSON.stringify(version) },
  logLevel: 'warning',
  metafile: true,
  loader: { '.css': 'text', '.md': 'text' },
};
const node = { ...common, platform: 'node', target: 'node20', mainFields: ['module', 'main'] };
const browser = { ...common, platform: 'browser', mainFields: ['browser', 'module', 'main'], conditions: ['browser'] };
// Bundled CommonJS asks for `require`, which an ES module does not have.
const requireInModules =
  "import{createRequire as __createRequire}from'node:module';const require=__createRequire(import.meta.url);";

/** Bundles one of our TypeScript files to an ES module that Node runs, for fuzz and bench. */
export const bundleForNode = (entry, outfile) =>
  build({ ...node, minify: false, entryPoints: [entry], outfile, format: 'esm', banner: { js: requireInModules } });

const shipped = [
  {
    ...node,
    entryPoints: ['client/extension/node.ts'],
    outfile: 'dist/extension.cjs',
    format: 'cjs',
    external: ['vscode'],
  },
  {
    ...browser,
    entryPoints: ['client/extension/browser.ts'],
    outfile: 'dist/browser-extension.js',
    format: 'cjs',
    external: ['vscode'],
  },
  { ...node, entryPoints: ['server/node.ts'], outfile: 'dist/server.cjs', format: 'cjs' },
  { ...browser, entryPoints: ['server/browser.ts'], outfile: 'dist/browser-server.js', format: 'iife' },
  {
    ...node,
    entryPoints: { lanewright: 'client/cli/main.ts' },
    outdir: 'dist',
    format: 'esm',
    splitting: true,
    outExtension: { '.js': '.mjs' },
    chunkNames: 'cli-[name]-[hash]',
    banner: { js: requireInModules },
  },
  { ...browser, entryPoints: ['client/preview/page.ts'], outfile: 'dist/preview.js', format: 'iife' },
];
const forTests = [
  {
    ...node,
    minify: false,
    entryPoints: { suite: 'test/editor/suite/node.ts' },
    outdir: 'dist/test',
    format: 'cjs',
    outExtension: { '.js': '.cjs' },
    external: ['vscode', 'mocha'],
  },
  {
    ...browser,
    minify: false,
    entryPoints: { 'suite-browser': 'test/editor/suite/browser.ts' },
    outdir: 'dist/test',
    format: 'cjs',
    external: ['vscode'],
  },
];

/** @param {{ tests?: boolean }} options @returns the metafiles by what they describe, for the size gate */
export async function buildAll({ tests = false } = {}) {
  await import('./schemas/build.mjs').then((schemas) => schemas.buildSchemas());
  mkdirSync(at('dist'), { recursive: true });
  const wanted = [...shipped, ...(tests ? forTests : [])];
  const results = await Promise.all(wanted.map((options) => build(options)));
  cpSync(at('client/preview/page.css'), at('dist/preview.css'));
  for (const [from, to] of [
    ['src-core/rules/README.md', 'rules.md'],
    ['schemas/README.md', 'format.md'],
  ]) {
    if (existsSync(at(from))) cpSync(at(from), at(`dist/${to}`));
  }
  const metafiles = results.map((result) => result.metafile);
  removeStale(new Set(metafiles.flatMap(({ outputs }) => Object.keys(outputs))));
  return metafiles;
}

/** What an earlier build left and this one did not write; at the end, so that what runs meanwhile finds its files. */
function removeStale(fresh) {
  for (const name of readdirSync(at('dist'))) {
    if (/^cli-.*\.mjs$/.test(name) && !fresh.has(`dist/${name}`)) rmSync(at(`dist/${name}`));
  }
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const metafiles = await buildAll({ tests: process.argv.includes('--tests') });
  if (process.argv.includes('--metafile')) writeFileSync(at('dist/meta.json'), JSON.stringify(metafiles));
}
