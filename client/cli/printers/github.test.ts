import { expect, test } from 'vitest';
import { github } from './github';
import { analysed, HOSTILE_FILE, hostileChannel, plainChannel, printed } from './testing';

/** What the forge's runner does with a line. */
function received(line: string) {
  const [, level, written, words] = /^::(error|warning|notice) (.*?)::(.*)$/s.exec(line)!;
  const decoded = (text: string) =>
    text.replace(/%3A/g, ':').replace(/%2C/g, ',').replace(/%0D/g, '\r').replace(/%0A/g, '\n').replace(/%25/g, '%');
  const properties = Object.fromEntries(
    written.split(',').map((pair) => [pair.slice(0, pair.indexOf('=')), decoded(pair.slice(pair.indexOf('=') + 1))]),
  );
  return { level, properties, words: decoded(words) };
}

const lines = (text: string) => text.trimEnd().split('\n');

test('an annotation stands at the finding, with its rule, words and fix', () => {
  const analysis = plainChannel((text) => text.replace('board.hole }', 'board.long-hole }'));
  const [line] = lines(printed(github, [analysis]));
  const { level, properties, words } = received(line);
  expect(level).toBe('warning');
  expect(properties).toEqual({
    file: 'lane.channel.yaml',
    line: '12',
    endLine: '12',
    col: '12',
    endColumn: '16',
    title: 'stub-resonance',
  });
  expect(words).toMatch(/^The 3\.62 mm stub of `dive` cuts a notch .*\nfix: Backdrill `dive` to 0\.25 mm/);
});

test('a good channel says nothing', () => {
  expect(printed(github, [plainChannel()])).toBe('');
});

test('the worst ten of each level over all files, then how many are left', () => {
  const spoilt = plainChannel((text) =>
    text
      .replace('limits:', `${Array.from({ length: 8 }, (_, i) => `x${i}-y: 1\n`).join('')}limits:`)
      .replace('board.hole }', 'board.long-hole }'),
  );
  const errors = spoilt.findings.filter(({ severity }) => severity === 'error').length;
  const warnings = spoilt.findings.filter(({ severity }) => severity === 'warning').length;
  expect(errors).toBeGreaterThan(5);
  const out = lines(printed(github, [spoilt, spoilt, spoilt]));
  const levels = out.slice(0, -1).map((line) => received(line).level);
  expect(levels).toEqual([...Array(10).fill('error'), ...Array(Math.min(10, 3 * warnings)).fill('warning')]);
  expect(out.at(-1)).toContain(`… and ${3 * errors + 3 * warnings - levels.length} more findings`);
});

test('an accepted finding is not told', () => {
  expect(printed(github, [analysed(hostileChannel())])).toContain('title=stub-resonance');
  expect(printed(github, [analysed(hostileChannel({ waived: true }))])).not.toContain('title=stub-resonance');
});

test('a hostile file gives commands of ours alone, with our properties alone', () => {
  const analysis = analysed(hostileChannel());
  const out = printed(github, [analysis]);
  expect(lines(out)).toHaveLength(analysis.findings.length);
  for (const line of lines(out)) {
    const { properties } = received(line);
    expect(Object.keys(properties)).toEqual(['file', 'line', 'endLine', 'col', 'endColumn', 'title']);
    expect(properties.file).toBe(HOSTILE_FILE.replace('\u202e', '\\u202e').replace('\u001b', '\\u001b'));
    expect(Number(properties.line)).toBeGreaterThan(1);
  }
  expect(out).not.toMatch(/##\[|^::(?!error |warning |notice )/m);
  expect(out.replaceAll('\n', '')).not.toMatch(/[\u0000-\u001f\u007f-\u009f\u061c\u202a-\u202e\u2066-\u2069]/);
});
