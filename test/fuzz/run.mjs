// `npm run fuzz`: every prefix, misspelling, dropped unit, deleted and badly indented line of every example, 10,000 random texts,
// 1,000 edit sequences. `npm run fuzz -- --seed 7 --every 10` does a tenth from another seed.
import { dirname, join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { parseArgs } from 'node:util';
import { install } from '../../tasks.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
install();
const { buildSchemas } = await import('../../schemas/build.mjs');
await buildSchemas();
const { bundleForNode } = await import('../../build.mjs');
const outfile = join(root, 'dist', 'test', 'fuzz.mjs');
await bundleForNode('test/fuzz/fuzz.ts', outfile);
const { fuzz } = await import(pathToFileURL(outfile).href);

const { values } = parseArgs({
  options: { seed: { type: 'string', default: '20261201' }, every: { type: 'string', default: '1' } },
});
const seed = Number(values.seed);
console.log(`seed ${seed}, every ${values.every}`);
const start = performance.now();
const { texts, faults, local, slowestMilliseconds } = await fuzz({
  root,
  seed,
  every: Number(values.every),
  randomEdits: 10_000,
  sequences: 1000,
  say: console.log,
});
const share = (part) => `${local.cases ? ((100 * part) / local.cases).toFixed(1) : '-'} %`;
console.log(
  `\n${texts} texts in ${((performance.now() - start) / 1000).toFixed(0)} s, slowest analysis ${slowestMilliseconds.toFixed(0)} ms`,
);
console.log(
  `faults inside one element: ${local.cases}; first finding in its lines ${share(local.firstFindingInside)}; all other elements keep their hints ${share(local.othersKept)}`,
);
console.log(`${faults.length} faults`);
for (const fault of faults.slice(0, 50)) console.log(`- ${fault}`);
process.exitCode = faults.length || local.othersKept < 0.95 * local.cases ? 1 : 0;
