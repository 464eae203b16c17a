import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { XMLValidator } from 'fast-xml-parser';
import { expect, test } from 'vitest';
import { emptyFolder, lanewright } from './run';

const SLED = 'examples/lanes/camera-sled.channel.yaml';
const check = (format: string, ...args: string[]) => lanewright(['check', '--format', format, ...args]);

test('one run writes the report of every build server beside the text for people', async () => {
  const folder = emptyFolder();
  const names = ['sarif', 'github', 'junit', 'gitlab'] as const;
  const formats = names.flatMap((name) => ['--format', `${name}=${join(folder, name)}`]);
  const { status, stdout } = await lanewright(['check', 'examples', '--format', 'text', ...formats]);
  const written = (name: (typeof names)[number]) => readFileSync(join(folder, name), 'utf8');
  expect(status).toBe(1);
  expect(stdout).toContain('stub-resonance');
  const { findings } = JSON.parse((await check('json', SLED)).stdout).files[0];
  const { line } = findings.find(({ rule }: { rule: string }) => rule === 'stub-resonance').location.range.start;
  expect(written('github')).toContain(`::error file=${SLED},line=${line},`);
  const results = JSON.parse(written('sarif')).runs[0].results as { ruleId: string; level: string }[];
  const entries = JSON.parse(written('gitlab')) as { check_name: string }[];
  expect(results.map(({ ruleId }) => ruleId)).toEqual(entries.map(({ check_name }) => check_name));
  expect(XMLValidator.validate(written('junit'))).toBe(true);
  expect(written('junit')).toContain(`<testsuite name="${SLED}"`);
  const failures = Number(/<testsuites [^>]*failures="(\d+)"/.exec(written('junit'))![1]);
  expect(failures).toBe(results.filter(({ level }) => level === 'error').length);
});

test('each report has the same bytes in any folder, locale and time zone, with and without colour', async () => {
  const names = ['sarif', 'github', 'junit', 'gitlab'];
  const run = async (path: string, options: Parameters<typeof lanewright>[1], ...args: string[]) => {
    const folder = emptyFolder();
    const formats = names.flatMap((name) => ['--format', `${name}=${join(folder, name)}`]);
    const { stderr } = await lanewright(['check', path, '--date', '2026-12-01', ...formats, ...args], options);
    expect(stderr).toBe('');
    return names.map((name) => readFileSync(join(folder, name), 'utf8'));
  };
  const here = await run(SLED, {});
  const environment = { LC_ALL: 'tr_TR.UTF-8', LANG: 'tr_TR.UTF-8', TZ: 'Asia/Kolkata' };
  const there = await run('camera-sled.channel.yaml', { cwd: 'examples/lanes', environment }, '--color', 'always');
  expect(there).toEqual(here);
});

test('JUnit fails what --fail-on counts', async () => {
  const blade = 'examples/lanes/blade.channel.yaml';
  const failures = async (...args: string[]) =>
    Number(/failures="(\d+)"/.exec((await check('junit', blade, ...args)).stdout)![1]);
  const errors = await failures();
  expect(errors).toBeGreaterThan(0);
  expect(await failures('--fail-on', 'warning')).toBeGreaterThan(errors);
  expect(await failures('--fail-on', 'never')).toBe(errors);
});

test('--quiet leaves errors', async () => {
  const { stdout } = await check('github', 'examples/lanes/blade.channel.yaml', '--quiet');
  expect(stdout).toMatch(/^::error /);
  expect(stdout).not.toContain('::warning');
});

test('a hostile file name gives no command of their own in the text for people either', async () => {
  const folder = emptyFolder();
  writeFileSync(join(folder, '::add-mask::x##[error]y.channel.yaml'), 'lanewright: 1\ntitle: "##[error]x"\n');
  for (const format of ['text', 'concise']) {
    const { stdout } = await lanewright(['check', '.', '--root', '.', '--format', format], { cwd: folder });
    expect(stdout).toContain('add-mask');
    expect(stdout).not.toMatch(/^\s*::|##\[/m);
  }
});
