import { expect, test } from 'vitest';
import { analyse } from './analyse';
import { withDependents } from './dependents';
import { gatherInputs } from './inputs';
import type { FileContent, FilePath } from './text/types';

const board = `lanewright: 1
parts:
  used: { kind: connector, delay: 40 ps, impedance: 95 ohm }
  spare: { kind: connector, delay: 50 ps, impedance: 95 ohm }
`;
const lane = (part: string, path = '../boards/main.parts.yaml') =>
  `lanewright: 1\nline-rate: 10 Gb/s\nuse: { board: ${path} }\npath:\n  - { connector: mate, part: board.${part} }\n`;

async function findings(texts: Readonly<Record<FilePath, string>>, file = 'boards/main.parts.yaml') {
  const all = new Map<FilePath, FileContent>(
    Object.entries(texts).map(([name, text]) => [name, { kind: 'text', text }] as const),
  );
  const files = { read: async (name: FilePath): Promise<FileContent> => all.get(name) ?? { kind: 'missing' } };
  const inputs = withDependents(await gatherInputs(files, file, '2026-12-01'), all);
  const analysis = analyse(inputs, undefined, { until: 'time' });
  return analysis.findings.map(({ rule, subject, message }) => `${rule} ${subject ?? message}`);
}

test('a part that no file at hand names is unused, one that any names is not', async () => {
  expect(await findings({ 'boards/main.parts.yaml': board, 'lanes/a.channel.yaml': lane('used') })).toEqual([
    'unused-part spare',
  ]);
  const both = { 'lanes/a.channel.yaml': lane('used'), 'lanes/b.channel.yaml': lane('spare') };
  expect(await findings({ 'boards/main.parts.yaml': board, ...both })).toEqual([]);
});
test('a parts file that no file at hand uses is a library for others', async () => {
  const elsewhere = lane('used', 'main.parts.yaml');
  expect(await findings({ 'boards/main.parts.yaml': board, 'lanes/a.channel.yaml': elsewhere })).toEqual([]);
});
test('what is wrong in a file that uses it is told there', async () => {
  const broken = `${lane('used').replace('10 Gb/s', '10 Gb/s @')}x: [\n`;
  const user = 'lanewright: 1\nuse: { board: main.parts.yaml }\nparts: { a: [ }\n';
  expect(
    await findings({ 'boards/main.parts.yaml': board, 'lanes/a.channel.yaml': broken, 'boards/b.parts.yaml': user }),
  ).toEqual(['unused-part spare']);
});
test('the rule runs again when a file that uses it changes', async () => {
  const read = (part: string) => {
    const all = new Map<FilePath, FileContent>([
      ['boards/main.parts.yaml', { kind: 'text', text: board }],
      ['lanes/a.channel.yaml', { kind: 'text', text: lane(part) }],
    ]);
    const files = { read: async (name: FilePath): Promise<FileContent> => all.get(name) ?? { kind: 'missing' } };
    return gatherInputs(files, 'boards/main.parts.yaml', '2026-12-01').then((inputs) => withDependents(inputs, all));
  };
  const first = analyse(await read('used'), undefined, { until: 'time' });
  const second = analyse(await read('spare'), first, { until: 'time' });
  expect([first, second].map(({ findings: [finding] }) => finding.subject)).toEqual(['spare', 'used']);
});
