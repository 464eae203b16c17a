import { execFile, execFileSync } from 'node:child_process';
import { chmodSync, cpSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
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
const commentSteps: readonly Step[] = forge.jobs.comment.steps;
const pipeline = read('examples/build/gitlab.yml').lanes;
const [hook] = read('.pre-commit-hooks.yaml');

/** A repository that has one good lane, and the command line among its packages as its README says. */
let repository: string;
beforeAll(async () => {
  // @ts-expect-error a plain script without types
  const { makeCommandLinePackage } = await import('../package-cli.mjs');
  repository = emptyFolder();
  const archive: string = makeCommandLinePackage(repository);
  git(repository, 'init', '-q', '-b', 'main');
  for (const folder of ['boards', 'models'])
    cpSync(join('examples', folder), join(repository, folder), { recursive: true });
  mkdirSync(join(repository, 'lanes'));
  cpSync('examples/lanes/ejector.channel.yaml', join(repository, 'lanes', 'ejector.channel.yaml'));
  writeFileSync(join(repository, '.gitignore'), 'node_modules\n');
  const { status, output } = await shell(`npm install --save-dev ./${archive.split('/').at(-1)}`, repository);
  expect(output).not.toMatch(/warn/i);
  expect(status).toBe(0);
  git(repository, 'add', '-A');
  git(repository, 'commit', '-q', '-m', 'channels');
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

const git = (folder: string, ...args: string[]) =>
  execFileSync('git', ['-c', 'user.name=someone', '-c', 'user.email=someone@lane.example', ...args], {
    cwd: folder,
    encoding: 'utf8',
  }).trim();

/** A fresh checkout of a pull request merged into its base: no packages, no reports. It adds a comment, or makes the lane fail. */
function checkout({ failing = false } = {}): string {
  const folder = emptyFolder();
  git(folder, 'clone', '-q', repository, '.');
  git(folder, 'checkout', '-q', '-b', 'change');
  const lane = join(folder, 'lanes', 'ejector.channel.yaml');
  const text = readFileSync(lane, 'utf8');
  writeFileSync(lane, failing ? text.replace('length: 64 mm', 'length: 2 m') : `${text}# a comment\n`);
  git(folder, 'commit', '-q', '-a', '-m', 'change');
  git(folder, 'checkout', '-q', 'main');
  git(folder, 'merge', '-q', '--no-ff', '--no-edit', 'change');
  return folder;
}

/** Every `run:` in turn, as the forge does: after a failure those alone that always run. */
async function runSteps(folder: string, event: 'pull_request' | 'push') {
  const summary = join(folder, 'summary.md');
  writeFileSync(summary, '');
  let failed: string | undefined;
  let output = '';
  for (const step of steps.filter(
    ({ run, if: when }) => run !== undefined && (when === undefined || when === 'always()'),
  )) {
    if (failed !== undefined && step.if !== 'always()') continue;
    const result = await shell(step.run!, folder, { GITHUB_STEP_SUMMARY: summary, GITHUB_EVENT_NAME: event });
    output += result.output;
    if (result.status !== 0) failed ??= step.name;
  }
  return { failed, output, summary: readFileSync(summary, 'utf8') };
}

describe('the workflow of a forge’s actions', () => {
  test('reads alone, but for the comment, which runs nothing of the pull request', () => {
    expect(forge.permissions).toEqual({ contents: 'read' });
    expect(forge.jobs.check.permissions).toBeUndefined();
    expect(forge.jobs.comment.permissions).toEqual({ 'pull-requests': 'write' });
    expect(JSON.stringify(commentSteps)).not.toMatch(/checkout|npm|node_modules/);
    expect(Object.keys(forge.on)).toEqual(['pull_request', 'push']);
  });
  test('a pull request that changes no figure is green, with the review as its summary', async () => {
    const { failed, output, summary } = await runSteps(checkout(), 'pull_request');
    expect(failed, output).toBeUndefined();
    expect(output).not.toContain('::error');
    expect(summary).toMatch(/^<!-- lanewright-review -->/);
  });
  test('one that makes a lane fail is red, with a note at its line, the review and the reports', async () => {
    const folder = checkout({ failing: true });
    const { failed, output, summary } = await runSteps(folder, 'pull_request');
    expect(failed).toBe('Check the channels');
    expect(output).toMatch(/^::error file=lanes\/ejector\.channel\.yaml,line=\d+,.*title=insertion-loss::/m);
    expect(summary).toContain('leave');
    const [{ results }] = JSON.parse(readFileSync(join(folder, 'lanes-report', 'lanes.sarif'), 'utf8')).runs;
    expect(results.map(({ ruleId }: { ruleId: string }) => ruleId)).toContain('insertion-loss');
  });
  test('the main line is checked as a whole, with the report as text', async () => {
    const { failed, summary } = await runSteps(checkout({ failing: true }), 'push');
    expect(failed).toBe('Check the channels');
    expect(summary).toMatch(/^ {4}lanes\/ejector\.channel\.yaml {2}fails/m);
    for (const line of summary.trimEnd().split('\n')) expect(line).toMatch(/^ {4}/);
  });
  test('the comment is written once, then updated', async () => {
    const folder = emptyFolder();
    const calls = join(folder, 'calls');
    const comment = async (known: string) => {
      writeFileSync(calls, '');
      const gh = join(folder, 'gh');
      writeFileSync(gh, `#!/bin/sh\necho "$*" >> '${calls}'\ncase "$*" in *--paginate*) echo '${known}';; esac\n`);
      chmodSync(gh, 0o755);
      const environment = { PATH: `${folder}:${process.env.PATH}`, GITHUB_REPOSITORY: 'team/lanes', NUMBER: '7' };
      const { status, output } = await shell(commentSteps.find(({ run }) => run)!.run!, folder, environment);
      expect(status, output).toBe(0);
      return readFileSync(calls, 'utf8').trim().split('\n').at(-1);
    };
    const body = '--field body=@lanes-report/review.md';
    expect(await comment('')).toBe(`api --silent --method POST repos/team/lanes/issues/7/comments ${body}`);
    expect(await comment('41')).toBe(`api --silent --method PATCH repos/team/lanes/issues/comments/41 ${body}`);
  });
  test('what is not run here is told as presumed', () => {
    const told = readFileSync('examples/build/README.md', 'utf8');
    for (const { uses } of [...steps, ...commentSteps]) if (uses) expect(told).toContain(`\`${uses}\``);
    expect(told).toContain(`\`${pipeline.image}\``);
  });
});

describe('the pipeline of another', () => {
  const run = (folder: string, base: string) =>
    shell(pipeline.script.join('\n'), folder, {
      CI_MERGE_REQUEST_DIFF_BASE_SHA: base && git(folder, 'rev-parse', base),
    });
  test('a merge request is green or red by what it changes, with both reports', async () => {
    const good = checkout();
    const first = await run(good, 'HEAD^1');
    expect(first.status, first.output).toBe(0);
    const bad = checkout({ failing: true });
    const second = await run(bad, 'HEAD^1');
    expect(second.status).toBe(1);
    expect(second.output).toContain('insertion-loss');
    for (const report of pipeline.artifacts.paths) expect(existsSync(join(bad, report))).toBe(true);
    expect(Object.values(pipeline.artifacts.reports).sort()).toEqual([...pipeline.artifacts.paths].sort());
    // parts that this one lane does not use are told as notes
    const entries = JSON.parse(readFileSync(join(good, pipeline.artifacts.reports.codequality), 'utf8'));
    for (const { severity } of entries) expect(severity).toBe('info');
    expect(readFileSync(join(bad, pipeline.artifacts.reports.junit), 'utf8')).toContain('<failure');
  });
  test('the main line is checked as a whole', async () => {
    const { status, output } = await run(checkout(), '');
    expect(output).toContain('meets its limits');
    expect(status).toBe(0);
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
