import { execFile, execFileSync } from 'node:child_process';
import { cpSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, test } from 'vitest';
import { parse } from 'yaml';
import { emptyFolder } from './run';

interface Step {
  readonly name?: string;
  readonly run?: string;
  readonly uses?: string;
  readonly if?: string;
}
const read = (file: string) => parse(readFileSync(file, 'utf8'));
const forge = read('examples/build/github.yml');
const steps: readonly Step[] = forge.jobs.check.steps;
const pipeline = read('examples/build/gitlab.yml').lanes;
const [hook] = read('.pre-commit-hooks.yaml');

/** A repository that has one good lane, and the command line among its packages as its README says. */
let repository: string;
beforeAll(async () => {
  // @ts-expect-error a plain script without types
  const { makeCommandLinePackage } = await import('../package-cli.mjs');
  repository = emptyFolder();
  const archive: string = makeCommandLinePackage(repository);
  execFileSync('git', ['init', '--quiet', repository]);
  for (const folder of ['boards', 'models'])
    cpSync(join('examples', folder), join(repository, folder), { recursive: true });
  mkdirSync(join(repository, 'lanes'));
  cpSync('examples/lanes/ejector.channel.yaml', join(repository, 'lanes', 'ejector.channel.yaml'));
  writeFileSync(join(repository, '.gitignore'), 'node_modules\n');
  const { status, output } = await shell(`npm install --save-dev ./${archive.split('/').at(-1)}`, repository);
  expect(output).not.toMatch(/warn/i);
  expect(status).toBe(0);
});

/** Runs a step as a build does: bash that ends at the first failure, and here without a network. */
function shell(command: string, cwd: string, environment: Readonly<Record<string, string>> = {}) {
  const env = { ...process.env, CI: 'true', npm_config_offline: 'true', npm_config_audit: 'false', ...environment };
  return new Promise<{ status: number; output: string }>((resolve) => {
    execFile('bash', ['-e', '-o', 'pipefail', '-c', command], { cwd, env }, (error, stdout, stderr) =>
      resolve({ status: error ? Number(error.code ?? 1) : 0, output: stdout + stderr }),
    );
  });
}

/** A fresh checkout of the repository: no packages, no reports. */
function checkout({ failing = false } = {}): string {
  const folder = emptyFolder();
  cpSync(repository, folder, { recursive: true, filter: (file) => !file.includes('node_modules') });
  const lane = join(folder, 'lanes', 'ejector.channel.yaml');
  if (failing) writeFileSync(lane, readFileSync(lane, 'utf8').replace('length: 64 mm', 'length: 2 m'));
  return folder;
}

/** Every `run:` in turn, as the forge does: after a failure those alone that always run. */
async function runSteps(folder: string) {
  const summary = join(folder, 'summary.md');
  writeFileSync(summary, '');
  let failed: string | undefined;
  let output = '';
  for (const step of steps.filter(
    ({ run, if: when }) => run !== undefined && (when === undefined || when === 'always()'),
  )) {
    if (failed !== undefined && step.if !== 'always()') continue;
    const result = await shell(step.run!, folder, { GITHUB_STEP_SUMMARY: summary });
    output += result.output;
    if (result.status !== 0) failed ??= step.name;
  }
  return { failed, output, summary: readFileSync(summary, 'utf8') };
}

describe('the workflow of a forge’s actions', () => {
  test('reads alone', () => {
    expect(forge.permissions).toEqual({ contents: 'read' });
    expect(Object.keys(forge.on)).toEqual(['pull_request', 'push']);
  });
  test('a good repository is green, with a summary', async () => {
    const folder = checkout();
    const { failed, summary } = await runSteps(folder);
    expect(failed).toBeUndefined();
    expect(summary).toMatch(/^ {4}lanes\/ejector\.channel\.yaml {2}meets its limits/m);
    for (const line of summary.trimEnd().split('\n')) expect(line).toMatch(/^ {4}/);
  });
  test('a lane that misses its limit is red, with a note at its line, the summary and the reports', async () => {
    const folder = checkout({ failing: true });
    const { failed, output, summary } = await runSteps(folder);
    expect(failed).toBe('Check the channels');
    expect(output).toMatch(/^::error file=lanes\/ejector\.channel\.yaml,line=\d+,.*title=insertion-loss::/m);
    expect(summary).toContain('fails');
    const [{ results }] = JSON.parse(readFileSync(join(folder, 'lanes-report', 'lanes.sarif'), 'utf8')).runs;
    expect(results.map(({ ruleId }: { ruleId: string }) => ruleId)).toContain('insertion-loss');
  });
  test('what is not run here is told as presumed', () => {
    const told = readFileSync('examples/build/README.md', 'utf8');
    for (const { uses } of steps) if (uses) expect(told).toContain(`\`${uses}\``);
    expect(told).toContain(`\`${pipeline.image}\``);
  });
});

describe('the pipeline of another', () => {
  const run = (folder: string) => shell(pipeline.script.join('\n'), folder);
  test('green and red, with both reports', async () => {
    const good = checkout();
    const first = await run(good);
    expect(first.output).toContain('meets its limits');
    expect(first.status).toBe(0);
    const bad = checkout({ failing: true });
    expect((await run(bad)).status).toBe(1);
    for (const report of pipeline.artifacts.paths) expect(existsSync(join(bad, report))).toBe(true);
    expect(Object.values(pipeline.artifacts.reports).sort()).toEqual([...pipeline.artifacts.paths].sort());
    // parts that this one lane does not use are told as notes
    const entries = JSON.parse(readFileSync(join(good, pipeline.artifacts.reports.codequality), 'utf8'));
    for (const { severity } of entries) expect(severity).toBe('info');
    expect(readFileSync(join(bad, pipeline.artifacts.reports.junit), 'utf8')).toContain('<failure');
  });
});

describe('the pre-commit hook', () => {
  test('fails where a lane does, and where the command is not installed', async () => {
    const folder = checkout({ failing: true });
    const missing = await shell(hook.entry, folder);
    expect(missing.status).toBe(1);
    expect(missing.output).toMatch(/Cannot find module .*node_modules\/lanewright/);
    await shell('npm ci --ignore-scripts', folder);
    const { status, output } = await shell(hook.entry, folder);
    expect(status).toBe(1);
    expect(output).toContain('insertion-loss');
    expect((await shell(hook.entry, repository)).status).toBe(0);
  });
  test('runs for what concerns a channel, and for nothing else', () => {
    // the one inline flag that the definition uses, as this language writes it
    const files = new RegExp(hook.files.replace('(?i)', ''), 'i');
    for (const file of [
      'lanes/a.channel.yaml',
      'b.parts.yaml',
      'models/x.S4P',
      'lanewright.config.yaml',
      'a/lanewright.config.yaml',
    ])
      expect(file).toMatch(files);
    for (const file of ['README.md', 'channel.yaml', 'a.channel.yaml.orig', 'my-lanewright.config.yaml'])
      expect(file).not.toMatch(files);
    expect(hook.pass_filenames).toBe(false);
  });
});
