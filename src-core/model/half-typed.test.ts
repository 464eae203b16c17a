import { expect, test } from 'vitest';
import { applyEdits, resolveEdits } from '../text/edits';
import { channelText, exampleModel, exampleTexts } from './fixtures';
import { changed, reportsIn } from './testing';

/** Each stands in place of the example's stub, which nothing refers to. */
const stub = channelText.slice(
  channelText.indexOf('  - stub: test-point'),
  channelText.indexOf('  - connector: sled-mate'),
);

test.each([
  ['a dash', '  -\n'],
  ['a dash and a space', '  - \n'],
  ['a word', '  - tr\n'],
  ['a kind', '  - trace\n'],
  ['a kind and a colon', '  - trace:\n'],
  ['a kind and a colon before the rest', '  - stub:\n    length: 0.9 mm\n    impedance: 50 ohm\n    dk: 3.6\n'],
  ['a word before the rest', '  - stu\n    length: 0.9 mm\n    impedance: 50 ohm\n    dk: 3.6\n'],
  ['no kind', '  - length: 0.9 mm\n    impedance: 50 ohm\n    dk: 3.6\n'],
  ['two kinds', '  - stub: tap\n    via: tap\n    length: 0.9 mm\n    impedance: 50 ohm\n    dk: 3.6\n'],
  ['an unknown kind', '  - stubb: tap\n    length: 0.9 mm\n    impedance: 50 ohm\n    dk: 3.6\n'],
  ['a colon without its space', '  - stub:tap\n    length: 0.9 mm\n    impedance: 50 ohm\n    dk: 3.6\n'],
  ['an open brace', '  - { stub: tap, length: 0.9 mm, impedance: 50 ohm, dk: 3.6\n'],
  ['an open quote', '  - stub: tap\n    length: 0.9 mm\n    impedance: 50 ohm\n    dk: 3.6\n    note: "for the test\n'],
])('%s: one finding, with a fix, in its own lines; the others keep what they have', (_, entry) => {
  const texts = exampleTexts({ channel: changed(stub, entry) });
  const start = texts['lanes/camera.channel.yaml'].indexOf(entry);
  const reports = reportsIn(texts);
  expect(reports.map(({ rule, message }) => `${rule}: ${message}`)).toHaveLength(1);
  expect(reports[0].fixes?.length).toBeGreaterThan(0);
  expect(reports[0].range.start).toBeGreaterThanOrEqual(start);
  expect(reports[0].range.end).toBeLessThanOrEqual(start + entry.length);
  const { model } = exampleModel(texts);
  const { model: whole } = exampleModel();
  expect(model.computable).toBe(true);
  expect(model.elements).toHaveLength(9);
  for (const index of [0, 1, 2, 3, 4, 5, 7, 8]) expect(model.elements[index]).toEqual(whole.elements[index]);
});

test.each([
  ['a key alone', '    value: 100 nF\n', '    value: 100 nF\n    es\n'],
  ['a key without value', '    esl: 0.3 nH\n', '    esl:\n'],
  ['a missing unit', '    esl: 0.3 nH\n', '    esl: 0.3\n'],
  ['a needed key without value', '    value: 100 nF\n', '    value:\n'],
  ['a needed key gone', '    value: 100 nF\n', ''],
  ['a misspelt key', '    esl: 0.3 nH\n', '    els: 0.3 nH\n'],
  ['a needed key misspelt', '    value: 100 nF\n', '    vlaue: 100 nF\n'],
  ['a needed key half typed', '    value: 100 nF\n', '    val\n'],
  ['a dash one space too far', '  - capacitor: coupling\n', '   - capacitor: coupling\n'],
  ['a dash two spaces too far', '  - capacitor: coupling\n', '    - capacitor: coupling\n'],
  ['a dash at the left', '  - capacitor: coupling\n', '- capacitor: coupling\n'],
  ['one tab', '    esl: 0.3 nH\n', '\tesl: 0.3 nH\n'],
  ['no colon', '    esl: 0.3 nH\n', '    esl 0.3 nH\n'],
  ['no space', '    esl: 0.3 nH\n', '    esl:0.3 nH\n'],
  ['one space too many', '    esl: 0.3 nH\n', '     esl: 0.3 nH\n'],
  ['one space too few', '    esl: 0.3 nH\n', '   esl: 0.3 nH\n'],
  ['no indentation', '    esl: 0.3 nH\n', 'esl: 0.3 nH\n'],
  ['a tab', '    esl: 0.3 nH\n', '\t\tesl: 0.3 nH\n'],
  ['a key twice', '    esl: 0.3 nH\n', '    esl: 0.3 nH\n    esl: 0.4 nH\n'],
])('inside an element, %s: one finding in its lines, the others unharmed', (_, from, to) => {
  const texts = exampleTexts({ channel: changed(from, to) });
  const text = texts['lanes/camera.channel.yaml'];
  const start = text.lastIndexOf('\n', text.indexOf('- capacitor: coupling'));
  const end = text.indexOf('  - stub: test-point');
  const reports = reportsIn(texts);
  expect(reports.map(({ rule, message }) => `${rule}: ${message}`)).toHaveLength(1);
  expect(reports[0].range.start).toBeGreaterThanOrEqual(start);
  expect(reports[0].range.end).toBeLessThanOrEqual(end);
  const { model } = exampleModel(texts);
  const { model: whole } = exampleModel();
  expect(model.elements).toHaveLength(9);
  for (const index of [0, 1, 2, 3, 4, 6, 7, 8]) expect(model.elements[index]).toEqual(whole.elements[index]);
});

test('the first entry without its dash', () => {
  const texts = exampleTexts({ channel: changed('  - package: camera-serdes\n', '') });
  expect(reportsIn(texts).map(({ rule, marked }) => `${rule} «${marked}»`)).toEqual(['yaml «length: 14 mm»']);
  const { model } = exampleModel(texts);
  const { model: whole } = exampleModel();
  expect(model.elements.slice(1)).toEqual(whole.elements.slice(1));
});

test('names that are missing are offered as they are at hand, not as an example has them', () => {
  const titles = (entry: string) =>
    reportsIn(exampleTexts({ channel: changed(stub, entry) })).flatMap(({ fixes = [] }) =>
      fixes.map(({ title }) => title),
    );
  const offered = titles('  - trace: tail\n    length: 1 mm\n    impedance: 100 ohm\n');
  expect(offered).toEqual(['Add `stackup: sled.main`', 'Add `layer: L1`', 'Add `layer: L3`', 'Add `layer: L6`']);
});

test('a key that is only begun is completed in two fixes, to an example of its kind', () => {
  let channel = changed('    length: 0.9 mm\n', '    len\n');
  const titles: string[] = [];
  for (let step = 0; step < 2; step++) {
    const found = reportsIn(exampleTexts({ channel }));
    expect(found).toHaveLength(1);
    const [fix] = found[0].fixes!;
    titles.push(fix.title);
    const { parsed } = exampleModel(exampleTexts({ channel }));
    channel = applyEdits(channel, resolveEdits(fix.edits, parsed));
  }
  expect(titles).toEqual(['Add the colon', 'Write `length` with the example `0.9 mm`']);
  expect(channel).toBe(channelText);
});
