import { expect, test } from 'vitest';
import type { Quantity } from '../../schemas/format/types';
import type { Waiver } from '../model/types';
import type { Finding } from '../report';
import { acceptanceOf, addWaivers } from './add-waivers';
import type { Judged } from './types';
import { acceptedText, applyWaivers } from './waivers';

const place = { file: 'lane.channel.yaml', path: ['limits', 0, 'min'] };
const finding: Finding = {
  rule: 'return-loss',
  severity: 'error',
  subject: 'match',
  at: place,
  message: 'too little',
  value: 9.06,
  worse: 'lower',
  valueText: '9.06 dB',
};

const upTo = (value: number, text: string, dimension = 'loss') => ({ value, text, dimension }) as Quantity;
const waiver = (more: Partial<Waiver> = {}): Waiver => ({
  index: 0,
  place: { file: 'lane.channel.yaml', path: ['waivers', 0] },
  rule: 'return-loss',
  at: 'match',
  until: '2026-12-31',
  by: 'us',
  reason: 'old',
  ...more,
});
const judged = (...waivers: Waiver[]) =>
  ({ model: { file: 'lane.channel.yaml', waivers }, inputs: { today: '2026-06-30' } }) as unknown as Judged;
const apply = (one: Waiver, ran = true) =>
  applyWaivers([finding], judged(one), { rules: ['return-loss', 'eye'], ran: () => ran });

test.each([
  [9.06, true, 'just meets it'],
  [9.07, false, 'just misses it'],
])('a return loss of 9.06 dB, accepted down to %d dB: accepted is %s, it %s', (value, accepted) => {
  const { findings, outgrown } = apply(waiver({ upTo: upTo(value, `${value} dB`) }));
  expect(findings[0].waivedBy !== undefined).toBe(accepted);
  expect(outgrown).toHaveLength(accepted ? 0 : 1);
});
test('beyond its value the finding returns and says what was accepted', () => {
  const { findings, outgrown } = apply(waiver({ upTo: upTo(9.5, '9.5 dB') }));
  expect(findings[0].related?.[0].message).toBe('It was accepted up to 9.5 dB only, by us.');
  expect(outgrown[0].message).toBe(
    '`return-loss` at `match` is now 9.06 dB, worse than the 9.5 dB that this waiver accepts; its finding counts again.',
  );
});
test('a value of another dimension accepts nothing', () => {
  const { findings, outgrown } = apply(waiver({ upTo: upTo(0.009, '9 mm', 'length') }));
  expect(findings[0].waivedBy).toBeUndefined();
  expect(outgrown[0].message).toContain('cannot be compared with the `9 mm`');
});
test('a bare number gets its unit by a fix; no waiver that once accepted something goes without a person’s word', () => {
  const bare = { ...upTo(9, '9', 'ratio'), unit: '' };
  const { outgrown } = apply(waiver({ upTo: bare }));
  expect(outgrown[0].fixes?.map(({ title, safe }) => [title, safe])).toEqual([
    ['Write `9 dB`', undefined],
    ['Remove this waiver', undefined],
  ]);
  const { outdated } = apply(waiver({ until: '2026-06-29' }));
  expect(outdated[0].fixes?.map(({ safe }) => safe)).toEqual([undefined]);
});
test.each([
  ['2026-06-30', true],
  ['2026-06-29', false],
])('on 2026-06-30 a waiver until %s accepts: %s', (until, accepted) => {
  const { findings, outdated } = apply(waiver({ until }));
  expect(findings[0].waivedBy !== undefined).toBe(accepted);
  expect(outdated).toHaveLength(accepted ? 0 : 1);
});
test('a waiver without a finding is dead, unless its rule could not run', () => {
  expect(apply(waiver({ at: 'other' })).dead[0]).toMatchObject({
    tags: ['unnecessary'],
    fixes: [{ safe: true, edits: [{ op: 'remove' }] }],
  });
  expect(apply(waiver({ at: 'other' }), false).dead).toHaveLength(0);
});

test('a waiver of a rule that does not exist is dead, with the near name as fix', () => {
  const [report] = apply(waiver({ rule: 'return-los' }), false).dead;
  expect(report.message).toBe('This waiver matches nothing: `return-los` is not a rule; did you mean `return-loss`?');
  expect(report.fixes?.[0]).toMatchObject({ safe: true, edits: [{ op: 'value', text: 'return-loss' }] });
});

test.each([
  [{ value: 9.064, valueText: '9.06 dB', worse: 'lower' }, '9.06 dB'],
  [{ value: 9.056, valueText: '9.06 dB', worse: 'lower' }, '9.05 dB'],
  [{ value: 24.12, valueText: '24.1 dB', worse: 'higher' }, '24.2 dB'],
  [{ value: 0.03149, valueText: '31.5 mV', worse: 'lower' }, '31.4 mV'],
  [{ value: 2.5e10, valueText: '25 GHz', worse: 'lower' }, '25 GHz'],
  [{ value: 0.0131, valueText: '1.3 %', worse: 'higher' }, '1.4 %'],
  [{}, undefined],
] as const)('what is accepted of %j covers it: %s', (report, text) => {
  expect(acceptedText({ ...finding, value: undefined, valueText: undefined, ...report })).toBe(text);
});

const acceptance = { by: 'connector team', until: '2027-03-31', reason: 'replaced: revision C' };

test('accepting adds a waiver; a reason that YAML would misread is quoted', () => {
  expect(acceptanceOf(judged(), finding, acceptance)).toEqual([
    {
      op: 'append',
      at: { file: 'lane.channel.yaml', path: ['waivers'] },
      lines: [
        'rule: return-loss',
        'at: match',
        'up-to: 9.06 dB',
        'until: 2027-03-31',
        'by: connector team',
        'reason: "replaced: revision C"',
      ],
    },
  ]);
});
test('accepting again renews the waiver that there is', () => {
  const edits = acceptanceOf(judged(waiver({ until: '2026-01-01' })), finding, acceptance);
  expect(edits.map((edit) => edit.op === 'set' && `${edit.key}: ${edit.text}`)).toEqual([
    'up-to: 9.06 dB',
    'until: 2027-03-31',
    'by: connector team',
    'reason: "replaced: revision C"',
  ]);
});
test('an old channel gets one waiver for each rule and subject, at the worst value', () => {
  const findings: Finding[] = [
    finding,
    { ...finding, value: 8, valueText: '8 dB' },
    { ...finding, subject: undefined },
    { ...finding, subject: 'other', waivedBy: place },
    { ...finding, rule: 'unused-part', severity: 'hint' },
    { ...finding, rule: 'unknown-name', subject: 'dive' },
    { ...finding, at: { file: 'board.parts.yaml', path: [] } },
  ];
  const edits = addWaivers({ ...judged(), findings }, acceptance);
  expect(edits.map((edit) => edit.op === 'append' && edit.lines[2])).toEqual(['up-to: 8 dB']);
});
