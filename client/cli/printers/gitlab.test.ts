import { expect, test } from 'vitest';
import { gitlab } from './gitlab';
import { analysed, hostileChannel, plainChannel, printed } from './testing';

interface Entry {
  readonly description: string;
  readonly check_name: string;
  readonly fingerprint: string;
  readonly severity: string;
  readonly location: { readonly path: string; readonly lines: { readonly begin: number } };
}
const read = (...analyses: Parameters<typeof printed>[1][]): Entry[] => JSON.parse(printed(gitlab, analyses.flat()));

test('an entry for each finding, at its line', () => {
  const [entry, ...rest] = read([plainChannel((text) => text.replace('board.hole }', 'board.long-hole }'))]);
  expect(rest).toEqual([]);
  expect(entry).toEqual({
    description: expect.stringMatching(/^The 3\.62 mm stub of `dive`/),
    check_name: 'stub-resonance',
    fingerprint: expect.stringMatching(/^[0-9a-f]{32}$/),
    severity: 'major',
    location: { path: 'lane.channel.yaml', lines: { begin: 12 } },
  });
});

test('no finding: an empty list', () => {
  expect(read([plainChannel()])).toEqual([]);
});

test('a fingerprint is one finding’s, even where two are alike', () => {
  const analysis = analysed(hostileChannel());
  const prints = read([analysis, analysis]).map(({ fingerprint }) => fingerprint);
  expect(prints).toHaveLength(2 * analysis.findings.length);
  expect(new Set(prints).size).toBe(prints.length);
});

test('an accepted finding is left out and renames no other', () => {
  const open = read([analysed(hostileChannel())]);
  const accepted = read([analysed(hostileChannel({ waived: true }))]);
  expect(accepted).toEqual(open.filter(({ check_name }) => check_name !== 'stub-resonance'));
});

test('hostile text is text', () => {
  const out = printed(gitlab, [analysed(hostileChannel())]);
  expect(out.replaceAll('\n', '')).not.toMatch(/[\u0000-\u001f\u007f-\u009f\u061c\u202a-\u202e\u2066-\u2069]/);
  for (const { description, location } of JSON.parse(out) as Entry[])
    expect(description + location.path).not.toMatch(
      /[\u0000-\u001f\u007f-\u009f\u061c\u202a-\u202e\u2066-\u2069]|##\[/,
    );
});
