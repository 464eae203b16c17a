import { expect, test } from 'vitest';
import { countingTheRest } from './diagnostics';

const found = (count: number) =>
  Array.from({ length: count }, (_, line) => ({
    range: { start: { line, character: 0 }, end: { line, character: 1 } },
    message: `finding ${line}`,
  }));
const messages = (count: number) => countingTheRest(found(count)).map(({ message }) => message);

test('the one that counts the rest is shown behind the two hundred', () => {
  expect(messages(201)).toHaveLength(201);
  expect(messages(201).at(-1)).toBe('finding 200');
});
test('what many channels find in one parts file is cut and counted', () => {
  expect(messages(260)).toHaveLength(201);
  expect(messages(260).at(-1)).toBe('60 more findings of other channels that use this file are not shown; 200 are.');
});
