import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { emptyFolder, lanewright } from './run';

const LANE = 'examples/lanes/ejector.channel.yaml';

describe('help', () => {
  test('names every command and its options; a mistyped command says what there is', async () => {
    const { stdout, status } = await lanewright(['--help']);
    expect(status).toBe(0);
    for (const name of ['check', 'curves', 'report', 'review']) {
      expect(stdout).toContain(name);
      const help = await lanewright([name, '--help']);
      expect(help.status).toBe(0);
      expect(help.stdout).toContain('Exit status');
      expect(Math.max(...help.stdout.split('\n').map((line) => line.length))).toBeLessThanOrEqual(110);
    }
    const wrong = await lanewright(['chek']);
    expect(wrong.status).toBe(2);
    expect(wrong.stderr).toContain('check');
    expect((await lanewright(['--version'])).stdout.trim()).toBe(
      JSON.parse(readFileSync('package.json', 'utf8')).version,
    );
  });
});

describe('curves', () => {
  test('CSV at just the frequencies asked for', async () => {
    const { stdout, status } = await lanewright(['curves', LANE, '--from', '1GHz', '--to', '5GHz', '--points', '5']);
    expect(status).toBe(0);
    const rows = stdout
      .trim()
      .split('\n')
      .map((row) => row.split(','));
    expect(rows[0].slice(0, 2)).toEqual(['frequency_Hz', 'SDD11_dB']);
    expect(rows.slice(1).map((row) => Number(row[0]))).toEqual([1e9, 2e9, 3e9, 4e9, 5e9]);
    expect(rows.flat().some((cell) => /NaN|Infinity/.test(cell))).toBe(false);
  });
  test('Touchstone that has four ports for a pair and two for a single conductor', async () => {
    const pair = await lanewright([
      'curves',
      LANE,
      '--format',
      'touchstone',
      '--from',
      '0',
      '--to',
      '10GHz',
      '--points',
      '11',
    ]);
    expect(pair.stdout).toMatch(/^# \S+ S RI R 50/m);
    const single = await lanewright([
      'curves',
      'examples/lanes/encoder.channel.yaml',
      '--format',
      'touchstone',
      '--from',
      '0',
      '--to',
      '2GHz',
      '--points',
      '3',
    ]);
    const numbers = single.stdout
      .split('\n')
      .filter((line) => line && !/^[!#]/.test(line))
      .join(' ')
      .trim()
      .split(/\s+/);
    expect(numbers).toHaveLength(3 * 9);
  });
  test('a piece of the path, and a wrong name', async () => {
    expect((await lanewright(['curves', LANE, '--between', 'leave,coupling'])).status).toBe(0);
    const wrong = await lanewright(['curves', LANE, '--between', 'leave,nowhere']);
    expect(wrong.status).toBe(2);
    expect(wrong.stderr).toContain('`nowhere` is not an element');
  });
});

describe('report', () => {
  test('a page that needs nothing else, Markdown, and one picture', async () => {
    const folder = emptyFolder();
    const page = join(folder, 'lane.html');
    expect((await lanewright(['report', LANE, '--output', page])).status).toBe(0);
    const html = readFileSync(page, 'utf8');
    expect(html).toContain('<svg');
    expect(html).not.toMatch(/<script|src="http|href="http/);
    expect((await lanewright(['report', LANE, '--format', 'md'])).stdout).toContain('| ');
    expect((await lanewright(['report', LANE, '--format', 'svg', '--plot', 'insertion-loss'])).stdout).toMatch(
      /^<\?xml [^>]*\?>\n<svg /,
    );
    expect(existsSync(`${page}.${process.pid}.tmp`)).toBe(false);
  });
});

describe('the README', () => {
  const commands = [...readFileSync('README.md', 'utf8').matchAll(/^npx lanewright (.*)$/gm)].map((match) => match[1]);
  test.each(commands)('npx lanewright %s', async (line) => {
    const { status, stderr } = await lanewright(line.split(' '));
    expect(stderr).toBe('');
    expect(status).toBe(0);
  });
  test('its commands were found', () => expect(commands.length).toBeGreaterThanOrEqual(5));
});
