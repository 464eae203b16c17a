import { expect, test } from 'vitest';
import { plainChannel } from './testing';
import { fingerprints, type ToldFinding, toldFile, worstFirst } from './told';

const stub = (change: (text: string) => string) => {
  const { findings } = toldFile(plainChannel((text) => change(text.replace('board.hole }', 'board.long-hole }'))));
  return findings.filter(({ rule }) => rule === 'stub-resonance');
};
const print = (findings: readonly ToldFinding[]) => findings.map(fingerprints());

test('a finding stays itself when lines move, figures change or another element comes before', () => {
  const before = stub((text) => text);
  expect(before).toHaveLength(1);
  const lines = stub((text) => text.replace('path:', '# a comment\n\npath:'));
  const moved = stub((text) =>
    text.replace(
      'path:\n',
      'path:\n  - { trace: extra, stackup: board.main, layer: L1, length: 3 mm, impedance: 100 ohm }\n',
    ),
  );
  const shorter = stub((text) => text.replace('layer: L3, length: 100 mm', 'layer: L3, length: 90 mm'));
  expect(lines[0].location).not.toEqual(before[0].location);
  for (const after of [lines, moved, shorter]) expect(print(after)).toEqual(print(before));
});

test('another element, another finding', () => {
  expect(print(stub((text) => text.replace('via: dive', 'via: plunge')))).not.toEqual(print(stub((text) => text)));
});

test('a finding without a subject is named by its way through the file, whatever the position', () => {
  const spelt = (text: string) =>
    text.replace('{ copper: L1', '{ copper: L1').replace('coupling, value:', 'coupling, valeu:');
  const [one] = toldFile(plainChannel(spelt)).findings.filter(({ rule }) => rule === 'schema');
  const [other] = toldFile(
    plainChannel((text) => spelt(text).replace(/ {2}- \{ package: chip.*\n/, '')),
  ).findings.filter(({ message }) => message === one.message);
  expect(one.identity).toEqual(other.identity);
  expect(one.identity.join(' ')).toContain('coupling');
  expect(one.identity.join(' ')).not.toMatch(/\d/);
});

test('findings that share an identity are told apart by their order', () => {
  const [one] = stub((text) => text);
  const [first, second] = print([one, one]);
  expect(first).toMatch(/^[0-9a-f]{32}$/);
  expect(second).not.toBe(first);
});

test('the worst come first, equals as they came', () => {
  const findings = (['hint', 'error', 'info', 'warning', 'error'] as const).map((severity, id) => ({ severity, id }));
  expect(worstFirst(findings).map(({ id }) => id)).toEqual([1, 4, 3, 2, 0]);
});
