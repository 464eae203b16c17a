// `npm run bench`: the budgets of the design beside what was measured in this run. Times are this machine's; ratios are the point.
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { setUp } from '../../tasks.mjs';
import { boardText, channelText } from './channels.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
await setUp();
const { bundleForNode } = await import('../../build.mjs');
const { benchServer } = await import('./server.mjs');
const { findPython } = await import('../editor/chromium.mjs');

const quantile = (values, q) =>
  [...values].sort((a, b) => a - b)[Math.min(values.length - 1, Math.floor(q * values.length))];
const ms = (value) => `${value < 10 ? value.toFixed(1) : value.toFixed(0)} ms`;
const rows = [];
const row = (what, measured, budget, met) =>
  rows.push({ what, measured, budget, met: met === undefined ? '' : met ? 'met' : 'MISSED' });

async function analysisRows() {
  const outfile = join(root, 'dist', 'bench-analysis.mjs');
  await bundleForNode('test/bench/analysis.ts', outfile);
  const { benchAnalysis } = await import(pathToFileURL(outfile).href);
  const base = channelText({ elements: 30 });
  // One element's length differs from one to the next.
  const variants = Array.from({ length: 7 }, (_, i) => base.replace(/(run-0[\s\S]*?length: )\S+/, `$1${8 + i * 0.5}`));
  const { cold, coldUntilTime, edit, eye, points, elements } = await benchAnalysis(
    { 'board.parts.yaml': boardText },
    variants,
    40,
  );
  const warm = (values) => values.slice(10);
  const coldMedian = quantile(warm(cold), 0.5);
  const ratio = quantile(warm(coldUntilTime), 0.5) / quantile(warm(edit), 0.5);
  row(`cold analysis with eye, ${elements} elements, ${points} points`, ms(coldMedian), 'see NumPy below');
  row('cold, text to pulse and findings, the eye apart', ms(quantile(warm(coldUntilTime), 0.5)), '');
  row('one element edited, the eye apart', ms(quantile(warm(edit), 0.5)), '');
  row('… cold against edit', `${ratio.toFixed(1)} times`, 'at least 5 times', ratio >= 5);
  row('the eye after an edit', ms(quantile(warm(eye), 0.5)), '');
  const numpy = spawnSync(findPython(), [join(root, 'test/bench/numpy_baseline.py')], {
    encoding: 'utf8',
    env: { ...process.env, OPENBLAS_NUM_THREADS: '1', OMP_NUM_THREADS: '1', MKL_NUM_THREADS: '1' },
  });
  if (numpy.status !== 0) {
    row('NumPy baseline', `failed: ${numpy.stderr.trim().split('\n').pop()}`, '', false);
    return;
  }
  const { vectorised, tuned } = JSON.parse(numpy.stdout.trim().split('\n').pop());
  row(
    '… NumPy, vectorised as an engineer would',
    `${ms(vectorised)}: ${(vectorised / coldMedian).toFixed(1)} times ours`,
    'at least 4 times',
    vectorised / coldMedian >= 4,
  );
  row(
    '… NumPy, hand-tuned',
    `${ms(tuned)}: ${(tuned / coldMedian).toFixed(2)} times ours`,
    'at least 1',
    tuned / coldMedian >= 1,
  );
}

async function serverRows() {
  const { toFindings, toPreview, memoryBeforeMiB, memoryAfterMiB } = await benchServer(
    join(root, 'dist', 'server.cjs'),
    { keystrokes: 60, settle: 2000 },
  );
  const warm = (values) => values.slice(10);
  row('keystroke to findings and hints, p50', ms(quantile(warm(toFindings), 0.5)), '');
  row(
    'keystroke to findings and hints, p95',
    ms(quantile(warm(toFindings), 0.95)),
    '50 ms',
    quantile(warm(toFindings), 0.95) <= 50,
  );
  row(
    'keystroke to preview with every curve and the eye, p95',
    ms(quantile(warm(toPreview), 0.95)),
    '150 ms',
    quantile(warm(toPreview), 0.95) <= 150,
  );
  row(
    'server memory (RSS) before and after 2,000 more edits',
    `${memoryBeforeMiB.toFixed(0)} → ${memoryAfterMiB.toFixed(0)} MiB`,
    'flat, under 300 MB',
    memoryAfterMiB * 1.048576 < 300 && memoryAfterMiB < memoryBeforeMiB * 1.25,
  );
}

function commandLineRows() {
  const cli = join(root, 'dist', 'lanewright.mjs');
  const time = (args, cwd = root) => {
    const start = performance.now();
    const result = spawnSync(process.execPath, [cli, ...args], { cwd, encoding: 'utf8', maxBuffer: 1 << 30 });
    return { milliseconds: performance.now() - start, ...result };
  };
  const starts = Array.from({ length: 7 }, () => time(['--version']).milliseconds);
  row('`lanewright --version`, median', ms(quantile(starts, 0.5)), '150 ms', quantile(starts, 0.5) <= 150);
  const folder = mkdtempSync(join(tmpdir(), 'lanewright-thousand-'));
  writeFileSync(join(folder, 'board.parts.yaml'), boardText);
  for (let i = 0; i < 1000; i++)
    writeFileSync(
      join(folder, `lane-${String(i).padStart(4, '0')}.channel.yaml`),
      channelText({
        elements: 10,
        vary: i,
        widths: 20,
        ctle: '{ dc-gain: -4 dB, zero: 6.445 GHz, poles: [6.445 GHz, 25.78 GHz] }',
      }),
    );
  const again = time(['check', '.', '--format', 'concise', '--fail-on', 'never', '--root', folder], folder);
  row(
    '1,000 ten-element NRZ channels by command line',
    `${(again.milliseconds / 1000).toFixed(1)} s${again.status === 0 ? '' : ` (status ${again.status})`}`,
    '60 s',
    again.milliseconds <= 60_000 && again.status === 0,
  );
  rmSync(folder, { recursive: true, force: true });
}

await analysisRows();
await serverRows();
commandLineRows();
const size = statSync(join(root, 'dist', 'server.cjs')).size + statSync(join(root, 'dist', 'extension.cjs')).size;
row('server and extension, bundled', `${(size / 1000).toFixed(0)} kB`, '');
const width = (key) => Math.max(...rows.map((entry) => entry[key].length));
console.log('');
console.log(
  `| ${'what'.padEnd(width('what'))} | ${'measured'.padEnd(width('measured'))} | ${'budget'.padEnd(width('budget'))} | |`,
);
console.log('| --- | --- | --- | --- |');
for (const { what, measured, budget, met } of rows)
  console.log(
    `| ${what.padEnd(width('what'))} | ${measured.padEnd(width('measured'))} | ${budget.padEnd(width('budget'))} | ${met} |`,
  );
