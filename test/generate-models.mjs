// Makes examples/models/mezzanine.s4p: an invented connector of no vendor's, so that the demo has a measured-like part.
// Three lossy line sections in each mode (pin field, body, pin field), legs coupled; passive, reciprocal and causal by construction.
// `node test/generate-models.mjs` writes it; with --check it compares and ends with 1 if the file is stale.
import { readFileSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

const target = fileURLToPath(new URL('../examples/models/mezzanine.s4p', import.meta.url));
const REFERENCE = 50;
const STEP_HZ = 100e6;
const LAST_HZ = 60e9;

/** Odd and even impedance in ohm, delay in ps, loss in dB at 10 GHz growing with the root of frequency. */
const sections = [
  { odd: 44, even: 52, delay: 14, loss: 0.06 },
  { odd: 51, even: 60, delay: 26, loss: 0.12 },
  { odd: 45, even: 53, delay: 12, loss: 0.05 },
];

const add = ([a, b], [c, d]) => [a + c, b + d];
const multiply = ([a, b], [c, d]) => [a * c - b * d, a * d + b * c];
const divide = ([a, b], [c, d]) => [(a * c + b * d) / (c * c + d * d), (b * c - a * d) / (c * c + d * d)];
const scale = (k, [a, b]) => [k * a, k * b];
const exp = ([a, b]) => [Math.exp(a) * Math.cos(b), Math.exp(a) * Math.sin(b)];

/** ABCD of a line. The root-of-frequency loss has as much phase as loss, as a skin effect does. */
function line(impedance, delay, loss, frequency) {
  const nepers = (loss / 8.685889638) * Math.sqrt(frequency / 10e9);
  const gamma = [nepers, nepers + 2 * Math.PI * frequency * delay * 1e-12];
  const [forward, backward] = [exp(gamma), exp(scale(-1, gamma))];
  const cosh = scale(0.5, add(forward, backward));
  const sinh = scale(0.5, add(forward, scale(-1, backward)));
  return [cosh, scale(impedance, sinh), scale(1 / impedance, sinh), cosh];
}

const chain = ([a, b, c, d], [e, f, g, h]) => [
  add(multiply(a, e), multiply(b, g)),
  add(multiply(a, f), multiply(b, h)),
  add(multiply(c, e), multiply(d, g)),
  add(multiply(c, f), multiply(d, h)),
];

/** S11, S21 and S22 of one mode; each mode's own reference is that of a leg. */
function mode(which, frequency) {
  const [a, b, c, d] = sections
    .map((section) => line(section[which], section.delay, section.loss, frequency))
    .reduce(chain);
  const bz = scale(1 / REFERENCE, b);
  const cz = scale(REFERENCE, c);
  const sum = add(add(a, bz), add(cz, d));
  return {
    s11: divide(add(add(a, bz), scale(-1, add(cz, d))), sum),
    s21: divide([2, 0], sum),
    s22: divide(add(add(scale(-1, a), bz), add(scale(-1, cz), d)), sum),
  };
}

const half = (even, odd, sign) => scale(0.5, add(even, scale(sign, odd)));

/** Ports 1 and 3 on one side (positive, negative), 2 and 4 on the other. */
function fourPort(frequency) {
  const odd = mode('odd', frequency);
  const even = mode('even', frequency);
  const own = (key) => half(even[key], odd[key], 1);
  const across = (key) => half(even[key], odd[key], -1);
  return [
    [own('s11'), own('s21'), across('s11'), across('s21')],
    [own('s21'), own('s22'), across('s21'), across('s22')],
    [across('s11'), across('s21'), own('s11'), own('s21')],
    [across('s21'), across('s22'), own('s21'), own('s22')],
  ];
}

const number = (value) => value.toFixed(9);
const lines = [
  '! Invented for the demo of a fruit-sorting machine: no vendor, no measurement. Made by test/generate-models.mjs.',
  '! Ports: 1 and 3 one side, 2 and 4 the other; 1 to 2 and 3 to 4 go through.',
  '# GHz S RI R 50',
];
for (let index = 0; index * STEP_HZ <= LAST_HZ; index++) {
  const frequency = index * STEP_HZ;
  fourPort(frequency).forEach((row, i) => {
    lines.push(
      `${i === 0 ? (frequency / 1e9).toFixed(2) : ' '} ${row.map(([re, im]) => `${number(re)} ${number(im)}`).join('  ')}`,
    );
  });
}
const text = `${lines.join('\n')}\n`;

if (process.argv.includes('--check')) {
  if (readFileSync(target, 'utf8') !== text) {
    console.error('examples/models/mezzanine.s4p is stale: run `node test/generate-models.mjs`.');
    process.exitCode = 1;
  }
} else writeFileSync(target, text);
