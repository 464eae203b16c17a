import { expect, test } from 'vitest';
import { analyse } from '../analyse';
import { inputsOf } from '../model/fixtures';

/** A cable of 5 ns/m at 10 Gb/s, whose window is at most 4,096 UI: 409.6 ns. */
const errorOf = (meters: number, ohms: number, more = '') => {
  const text = `lanewright: 1
line-rate: 10 Gb/s
path:
  - cable: long
    length: ${meters} m
    impedance: ${ohms} ohm
    delay: 5 ns/m
    loss: 0 dB/m @ 5 GHz
${more}`;
  const { cascade, networks, findings } = analyse(inputsOf({ '/lane.channel.yaml': text }), undefined, {
    until: 'time',
  });
  return { error: cascade!.remainingError, coarse: networks!.grid.tooCoarse, rules: findings.map(({ rule }) => rule) };
};

test('a grid that holds the response leaves nothing to measure', () => {
  expect(errorOf(1, 25)).toEqual({ error: undefined, coarse: undefined, rules: [] });
});

test.each([60, 61.3, 77.7])(
  'the first echo of %d m of 25 ohm without loss falls outside the window: 0.6² of the main cursor, whatever the phase at any frequency',
  (meters) => {
    const { error, rules } = errorOf(meters, 25);
    expect(error).toBeGreaterThan(0.36 / 1.1);
    expect(error).toBeLessThan(0.36 * 1.6);
    expect(rules).toContain('grid-limit');
  },
);

test('a matched cable is only late: delay that goes round the window moves no cursor', () => {
  const { error, coarse, rules } = errorOf(60, 100);
  expect(coarse).toBe(true);
  expect(error).toBeLessThan(1e-3);
  expect(rules).not.toContain('grid-limit');
});

test('an echo of a later period is heard as well, if less exactly', () => {
  // there and back in 1,300 ns, more than three windows
  const { error } = errorOf(130, 40);
  const echo = (60 / 140) ** 2;
  expect(error).toBeGreaterThan(echo / 1.7);
  expect(error).toBeLessThan(1.6 * echo);
});

test('ends are heard too, as they are', () => {
  const ends = 'transmitter: { swing: 1 V, impedance: 50 ohm }\nreceiver: { impedance: 200 ohm }\n';
  const { error } = errorOf(60, 100, ends);
  expect(error).toBeGreaterThan(1 / 9 / 1.1);
  expect(error).toBeLessThan(1.6 / 9);
});
