import { describe, expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { largestSingularValue } from '../networks/singular-value';
import { appendLine, appendSeries, appendShunt, hyperbolic, scatterChain, startChain } from '../physics/chain';
import {
  element,
  farads,
  grid,
  meters,
  networkOf,
  ohms,
  prepared,
  quantity,
  ratio,
  seconds,
  singleEnded,
} from './testing';

/** Scattering in 50 ohm of what `build` appends. */
function scattered(build: (chain: Float64Array) => void): Float64Array {
  const chain = new Float64Array(8);
  const out = new Float64Array(8);
  startChain(chain);
  build(chain);
  scatterChain(chain, 50, out, 0);
  return out;
}

checkValues({
  id: 'N-01',
  what: 'series 50 ohm between 50 ohm ports: S11, S21; shunt 50 ohm: S11, S21',
  source: 'Pozar, Microwave Engineering, Tables 4.1, 4.2; exact',
  absoluteTolerance: 1e-12,
  compute: () => {
    const series = scattered((chain) => appendSeries(chain, 50, 0));
    const shunt = scattered((chain) => appendShunt(chain, 1 / 50, 0));
    return [series[0], series[4], shunt[0], shunt[4]];
  },
  rows: [{ expected: [1 / 3, 2 / 3, -1 / 3, 2 / 3] }],
});

checkValues({
  id: 'N-02',
  what: 'series 1 nH then shunt 0.2 pF at 5 GHz: S11, S21',
  source: 'exact',
  absoluteTolerance: 1e-6,
  compute: () => {
    const omega = 2 * Math.PI * 5e9;
    const s = scattered((chain) => {
      appendSeries(chain, 0, omega * 1e-9);
      appendShunt(chain, 0, omega * 0.2e-12);
    });
    return [s[0], s[1], s[4], s[5]];
  },
  rows: [{ expected: [-0.014436, 0.181828, 0.871318, -0.455561] }],
});

checkValues({
  id: 'N-05',
  what: 'quarter-wave transformer 10 to 50 ohm: its impedance; reflection at the edge of a band of 0.29316',
  source: 'Pozar, Microwave Engineering, Example 5.5',
  relativeTolerance: 1e-4,
  compute: () => {
    const z = Math.sqrt(10 * 50);
    const theta = (Math.PI / 2) * (1 - 0.29316 / 2);
    // the line from 50 ohm, closed by 10 ohm: in series with 40 more it would be matched, so the load stands as a shunt of 12.5 ohm
    const s = scattered((chain) => {
      const h = new Float64Array(4);
      hyperbolic(0, theta, h);
      appendLine(chain, h, z, 0);
      appendShunt(chain, 1 / 12.5, 0);
    });
    // seen from the 50 ohm side: 12.5 ohm beside the port's 50 make the 10 ohm load
    return [z, Math.hypot(s[0], s[1])];
  },
  rows: [{ expected: [22.3607, 0.2] }],
});

checkValues({
  id: 'N-17',
  what: '100 nF in series between 50 ohm ports, at its corner of 15.915 kHz: |S21|',
  source: 'exact',
  relativeTolerance: 1e-5,
  printedWithin: 5e-4,
  compute: () => {
    const corner = 1 / (2 * Math.PI * 100e-9 * 100);
    const s = scattered((chain) => appendSeries(chain, 0, -1 / (2 * Math.PI * corner * 100e-9)));
    return [corner / 1e3, Math.hypot(s[4], s[5])];
  },
  rows: [{ expected: [15.915, Math.SQRT1_2] }],
});

checkValues({
  id: 'N-19',
  what: 'series 25 ohm, then a 60 ohm line of 1 rad: largest singular value, and the smaller as |det S| over it',
  source: 'exact',
  absoluteTolerance: 1e-6,
  compute: () => {
    const s = scattered((chain) => {
      const h = new Float64Array(4);
      hyperbolic(0, 1, h);
      appendSeries(chain, 25, 0);
      appendLine(chain, h, 60, 0);
    });
    const largest = largestSingularValue(s, 2);
    const re = s[0] * s[6] - s[1] * s[7] - (s[2] * s[4] - s[3] * s[5]);
    const im = s[0] * s[7] + s[1] * s[6] - (s[2] * s[5] + s[3] * s[4]);
    return [largest, Math.hypot(re, im) / largest];
  },
  rows: [{ expected: [1, 0.64247] }],
});

describe('stub', () => {
  const mil = 25.4e-6;
  const stub = (length: number, dk: number, more = {}) =>
    element('stub', { length: meters(length), impedance: ohms(50), dk: ratio(dk), ...more });

  checkValues({
    id: 'N-06',
    what: 'first notch of an open stub, GHz',
    source: 'c/(4 L √ε), exact',
    relativeTolerance: 1e-4,
    compute: ({ length, dk }) => prepared(stub(length * mil, dk)).facts.stubs[0].notchHz / 1e9,
    rows: [
      { length: 10, dk: 4, expected: 147.536 },
      { length: 20, dk: 4, expected: 73.768 },
      { length: 40, dk: 4, expected: 36.884 },
      { length: 75, dk: 4, expected: 19.671 },
      { length: 75, dk: 3.5, expected: 21.03 },
      { length: 75, dk: 4.3, expected: 18.973 },
    ],
  });

  checkValues({
    id: 'N-07',
    what: 'shunt open stub 50 ohm, 75 mil, ε 4 at 10 GHz and at 0.704833 of the notch: |S21|, dB, dB',
    source: 'S21 = 2/(2 + j (Z0/Zs) tan θ), exact',
    relativeTolerance: 1e-5,
    compute: () => {
      const notch = 299792458 / (4 * 75 * mil * 2);
      const { differential } = networkOf(stub(75 * mil, 4), Float64Array.of(10e9, 0.704833 * notch));
      const size = (i: number) => Math.hypot(differential[8 * i + 4], differential[8 * i + 5]);
      return [size(0), 20 * Math.log10(size(0)), 20 * Math.log10(size(1))];
    },
    rows: [{ expected: [0.889646, -1.01565, -3.0103] }],
  });

  checkValues({
    id: 'V-07',
    what: 'stub 60 mil, 40 ohm, ε 3.6: notch in GHz, without and with 0.05 pF at its end',
    source: 'tan θ = 1/(ω C Zs), exact',
    relativeTolerance: 1e-5,
    printedWithin: 5e-4,
    compute: () => {
      const of = (end: number) =>
        prepared(stub(60 * mil, 3.6, { impedance: ohms(40), 'end-capacitance': farads(end) })).facts.stubs[0].notchHz /
        1e9;
      return [of(0), of(0.05e-12)];
    },
    rows: [{ expected: [25.919, 21.555] }],
  });

  test('its tolerance lowers the lowest notch; none of no length', () => {
    const one = element('stub', { length: meters(1e-3, 0.2e-3), impedance: ohms(50), dk: ratio(4) });
    const [{ lowestNotchHz, notchHz, lengthRangeMeters }] = prepared(one).facts.stubs;
    expect(lengthRangeMeters[1]).toBeCloseTo(1.2e-3, 12);
    expect(lowestNotchHz / notchHz).toBeCloseTo(1 / 1.2, 9);
    expect(prepared(stub(0, 4)).facts.stubs[0].notchHz).toBe(Number.POSITIVE_INFINITY);
  });
});

describe('capacitor', () => {
  const one = element('capacitor', {
    value: farads(100e-9),
    esl: quantity(0.3e-9, 'inductance'),
    esr: ohms(0.02),
    'pad-capacitance': farads(30e-15),
  });

  test('goes on to DC as a short with its resistance: no high-pass enters the grid', () => {
    const { differential, common } = networkOf(one, grid(1e9, 3));
    expect(differential[4]).toBeCloseTo(100 / (100 + 0.02), 12);
    expect(differential[5]).toBeCloseTo(0, 15);
    expect(common).toBe(differential);
  });

  test('its value changes nothing on the grid', () => {
    const of = (value: number) =>
      networkOf(element('capacitor', { ...one.values, value: farads(value) }), grid(1e9, 9));
    expect(of(1e-9)).toEqual(of(100e-6));
  });

  test('single-ended there is the one conductor alone', () => {
    expect(networkOf(one, grid(1e9, 2), singleEnded).common).toBeUndefined();
  });
});

describe('connector', () => {
  const connector = (more = {}) => element('connector', { delay: seconds(60e-12), impedance: ohms(95), ...more });

  test('is half its capacitance, a line, and the other half', () => {
    const hz = 8e9;
    const { differential } = networkOf(connector({ capacitance: farads(80e-15) }), Float64Array.of(hz));
    const omega = 2 * Math.PI * hz;
    const expected = scattered((chain) => {
      const h = new Float64Array(4);
      hyperbolic(0, omega * 60e-12, h);
      appendShunt(chain, 0, omega * 40e-15);
      appendLine(chain, h, 47.5, 0);
      appendShunt(chain, 0, omega * 40e-15);
    });
    for (let i = 0; i < 8; i++) expect(differential[i]).toBeCloseTo(expected[i], 12);
  });

  test('says that a skew written as a length has no meaning here', () => {
    const { notes, facts } = prepared(connector({ skew: meters(0.2e-3) }));
    expect(notes[0].rule).toBe('model-range');
    expect(facts.skewSeconds).toBe(0);
  });
});
