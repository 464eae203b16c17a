import { expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { dbPerMeter, element, meters, networkOf as networkOfElement, ohms, secondsPerMeter } from '../elements/testing';
import { stepResponse } from '../time/tdr';
import { fullOf, toSingleEnded } from './mixed-mode';
import { renormalise } from './renormalise';
import { magnitude } from './testing';
import type { TwoPort } from './types';

checkValues({
  id: 'N-10',
  what: 'standing wave ratio 1.5 and 2, as a junction of two resistances: reflection, return loss and mismatch loss in dB',
  source: 'exact',
  absoluteTolerance: 1e-4,
  printedWithin: 5e-4,
  compute: ({ ratio }) => {
    const through = Float64Array.of(0, 0, 1, 0, 1, 0, 0, 0);
    const junction = renormalise(through, [50, 50], [50, 50 / ratio]);
    return [Math.abs(junction[0]), -20 * Math.log10(Math.abs(junction[0])), -20 * Math.log10(Math.abs(junction[4]))];
  },
  rows: [
    { ratio: 1.5, expected: [0.2, 13.979, 0.17729] },
    { ratio: 2, expected: [1 / 3, 9.542, 0.51153] },
  ],
});

/** Ports p1, n1, p2, n2 of one frequency's 32 numbers. */
const entry = (to: number, from: number) => 2 * (4 * (to - 1) + from - 1);
const [near, through, far] = [entry(2, 1), entry(3, 1), entry(4, 1)];

/** Even 60, odd 2500/60 ohm, 1 ns without loss: a declared cable, with its common impedance. */
const coupled = (frequencies: Float64Array) =>
  toSingleEnded(
    fullOf(
      networkOfElement(
        element('cable', {
          length: meters(0.2),
          impedance: ohms(5000 / 60),
          'common-impedance': ohms(30),
          delay: secondsPerMeter(5e-9),
          loss: [dbPerMeter(0, 10e9)],
        }),
        frequencies,
      ),
    ),
  );

checkValues({
  id: 'N-14',
  what: 'matched coupled lines, even 60 and odd 2500/60 ohm: near end and through at 90° and 45°, coupling in dB at 90°',
  source: 'Pozar, Microwave Engineering, section 7.6, exact',
  absoluteTolerance: 1e-5,
  printedWithin: 5e-5,
  compute: ({ degrees }) => {
    const s = coupled(Float64Array.of(degrees / 360 / 1e-9));
    const sizes = [magnitude(s, near), magnitude(s, through)];
    return degrees === 90 ? [...sizes, 20 * Math.log10(sizes[0])] : sizes;
  },
  rows: [
    { degrees: 90, expected: [0.180328, 0.983607, -14.8787] },
    { degrees: 45, expected: [0.12856, 0.991702] },
  ],
});

test('N-14 nothing reflects and nothing arrives at the far end of the other line', () => {
  const s = coupled(Float64Array.of(0.11e9, 0.25e9));
  for (const at of [0, 32]) for (const port of [entry(1, 1), far]) expect(magnitude(s, at + port)).toBeLessThan(1e-12);
});

/** One entry over frequency, with the edge's spectrum, as a step response; time in picoseconds. */
function stepOf(s: Float64Array, offset: number, stepHz: number, edge: (f: number) => number) {
  const points = s.length / 32;
  const spectrum = new Float64Array(2 * points);
  for (let i = 0; i < points; i++)
    for (const part of [0, 1]) spectrum[2 * i + part] = s[32 * i + offset + part] * edge(i * stepHz);
  const samples = 4 * (points - 1);
  const wave = stepResponse(spectrum, stepHz, samples, 200e-12);
  return { wave, at: (seconds: number) => wave[Math.round(seconds * samples * stepHz)] };
}
const evenly = (stepHz: number, points: number) => Float64Array.from({ length: points }, (_, i) => i * stepHz);
const gaussian = (sigma: number) => (f: number) => Math.exp(-((2 * Math.PI * f * sigma) ** 2) / 2);

checkValues({
  id: 'N-15',
  what: 'the same lines, step at the near end of the other: plateau of twice the delay, then what its far end sends back',
  source: 'exact, (√Ze − √Zo)/(√Ze + √Zo)',
  absoluteTolerance: 1e-5,
  compute: () => {
    const stepHz = 20e6;
    const { at } = stepOf(coupled(evenly(stepHz, 2049)), near, stepHz, gaussian(25e-12));
    return [at(1e-9), at(1.8e-9)];
  },
  rows: [{ expected: [1 / 11, 1 / 11] }],
});

/** Matched modes of unlike delay. */
function twoDelays(frequencies: Float64Array, evenSeconds: number, oddSeconds: number) {
  const mode = (seconds: number): TwoPort => {
    const s = new Float64Array(8 * frequencies.length);
    frequencies.forEach((f, i) => {
      const angle = -2 * Math.PI * f * seconds;
      for (const offset of [2, 4]) s.set([Math.cos(angle), Math.sin(angle)], 8 * i + offset);
    });
    return s;
  };
  return toSingleEnded(fullOf({ differential: mode(oddSeconds), common: mode(evenSeconds) }));
}

checkValues({
  id: 'N-20',
  what: 'far end of matched lines whose even mode is 4 ps later: size at 10 GHz in dB; peak of a step with a ramp of 20 ps',
  source: 'derived, (v(t − te) − v(t − to))/2',
  absoluteTolerance: 1e-3,
  compute: () => {
    const one = twoDelays(Float64Array.of(10e9), 104e-12, 100e-12);
    const stepHz = 50e6;
    const points = 65537;
    const ramp = (f: number) => (f === 0 ? 1 : Math.sin(Math.PI * f * 20e-12) / (Math.PI * f * 20e-12));
    const { wave } = stepOf(twoDelays(evenly(stepHz, points), 1.004e-9, 1e-9), far, stepHz, ramp);
    return [20 * Math.log10(magnitude(one, far)), wave.reduce((least, value) => Math.min(least, value), 0)];
  },
  rows: [{ expected: [-18.039, -0.1] }],
});
