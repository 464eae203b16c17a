import fc from 'fast-check';
import { expect, test, vi } from 'vitest';
import { buildModel } from '../model/build';
import { channelText, exampleTexts, inputsOf, parsedOf, partsText } from '../model/fixtures';
import { parseFile } from './parse';
import { rangeOf } from './range';
import { FILE, strayRanges } from './testing';

// These run long on a busy machine; none asserts a time.
vi.setConfig({ testTimeout: 120_000 });

function isSound(text: string): boolean {
  const parsed = parseFile(FILE, text);
  JSON.stringify(parsed.value);
  return strayRanges(parsed).length === 0;
}

test('every prefix of the examples is read, each range inside it', () => {
  for (const text of [channelText, partsText]) {
    for (let end = 0; end <= text.length; end += 11)
      if (!isSound(text.slice(0, end))) expect(text.slice(0, end)).toBe('sound');
  }
});

test('every prefix gives a model whose findings stand inside the texts', () => {
  for (let end = 0; end <= channelText.length; end += 61) {
    const inputs = inputsOf(exampleTexts({ channel: channelText.slice(0, end) }));
    const parsed = parsedOf(inputs);
    for (const report of buildModel(inputs, parsed).reports) {
      const range = rangeOf(parsed.get(report.at.file)!, report.at);
      expect(range.start <= range.end && range.end <= parsed.get(report.at.file)!.text.length).toBe(true);
    }
  }
});

const splice = fc.tuple(
  fc.nat(channelText.length),
  fc.nat(12),
  fc.constantFrom(
    '',
    ':',
    ' ',
    '\n',
    '- ',
    '{',
    '}',
    '[',
    ']',
    '"',
    "'",
    '&a',
    '*a',
    '|',
    '>',
    '\t',
    '#',
    ',',
    '---\n',
    '? ',
    '!',
    '%',
    '@',
    '\r\n',
    '  ',
    '\u2028',
    '🍎',
    '\u0000',
    '\u001f',
    '<<: *a',
    'a:b',
  ),
);

test('random edits are read, each range inside the text', () => {
  fc.assert(
    fc.property(fc.array(splice, { minLength: 1, maxLength: 6 }), (splices) => {
      let text = channelText;
      for (const [at, length, added] of splices) text = text.slice(0, at) + added + text.slice(at + length);
      return isSound(text);
    }),
    { numRuns: 60, seed: 7 },
  );
});

test('random lines of YAML’s own signs are read, every range inside the text', () => {
  const sign = fc.constantFrom(
    'a',
    'b: ',
    '- ',
    ':',
    '{',
    '}',
    '[',
    ']',
    ',',
    '"',
    "'",
    '\n',
    '\n  ',
    '\n    ',
    '\t',
    '# ',
    '&x ',
    '*x',
    '|',
    '<<: ',
    '1,5',
    '---\n',
  );
  fc.assert(
    fc.property(fc.array(sign, { maxLength: 40 }), (signs) => {
      const text = signs.join('');
      const parsed = parseFile(FILE, text);
      return strayRanges(parsed).length === 0;
    }),
    { numRuns: 500, seed: 11 },
  );
});
