import { checkValues } from '../../test/check-values';
import { endFilters } from '../networks/pulse-spectrum';
import { symbolSpectrum } from './symbol-spectrum';
import { stepResponse } from './tdr';
import { transfer } from './terminations';
import { delayOf, gridFor, matchedPath, modelOf } from './testing';

checkValues({
  id: 'D-05',
  what: 'a step of 1 V, 25 ohm, through a 50 ohm line into 100 ohm: voltage at the load after arrivals 1 to 4',
  source: 'bounce diagram, exact',
  absoluteTolerance: 1e-6,
  compute: () => {
    const grid = gridFor(25e9, 10);
    const end = (ohms: number) => ({ ohms, farads: 0 });
    const ends = { source: end(25), load: end(100), referenceOhms: 50 };
    const H = transfer(matchedPath(grid, delayOf(1e-9)), grid.frequencies, ends, ends);
    const sigma = 20e-12;
    for (let i = 0; i < grid.points; i++) {
      // 1 V behind the resistance is half a volt into a matched load
      const edge = Math.exp(-((2 * Math.PI * grid.frequencies[i] * sigma) ** 2) / 2) / 2;
      H[2 * i] *= edge;
      H[2 * i + 1] *= edge;
    }
    const samples = 4 * (grid.points - 1);
    const wave = stepResponse(H, grid.stepHz, samples, 200e-12);
    return [2, 4, 6, 8].map((nanoseconds) => wave[Math.round(nanoseconds * 1e-9 * samples * grid.stepHz)]);
  },
  rows: [{ expected: [0.888889, 0.790123, 0.801097, 0.799878] }],
});

const shape = { symbolRate: 25e9, taps: [1], mainTap: 0 };

checkValues({
  id: 'D-13',
  what: 'the edge: 10 to 90 % (1.52270 of 20 to 80 %) times its −3 dB',
  source: 'exact',
  relativeTolerance: 1e-5,
  compute: () => {
    const riseTimeSeconds = 10e-12;
    const sizeAt = (f: number) => {
      const at = (rise: number) => symbolSpectrum({ ...shape, riseTimeSeconds: rise }, Float64Array.of(f));
      return Math.hypot(...at(riseTimeSeconds)) / Math.hypot(...at(0));
    };
    let [low, high] = [1e9, 24.9e9];
    while (high - low > 1) {
      const middle = (low + high) / 2;
      if (sizeAt(middle) > Math.SQRT1_2) low = middle;
      else high = middle;
    }
    return (2.5631031 / 1.6832425) * riseTimeSeconds * low;
  },
  rows: [{ expected: 0.339624 }],
});

checkValues({
  id: 'S-20',
  what: 'the edge as two poles of a Butterworth, for bounds: 20 to 80 % rise of its step times its −3 dB',
  source: 'exact',
  relativeTolerance: 1e-4,
  compute: () => {
    // −3 dB of the bound itself, then the rise of 1 − e^{−x}(cos x + sin x), x = ω t/√2
    const filters = endFilters(modelOf({ receiver: { bandwidthHz: 1e15 }, transmitter: { riseTimeSeconds: 10e-12 } }));
    const root = (f: (x: number) => number, from: number, to: number) => {
      let [a, b] = [from, to];
      for (let i = 0; i < 60; i++) {
        const middle = (a + b) / 2;
        if (f(middle) < 0) a = middle;
        else b = middle;
      }
      return a;
    };
    const bandwidth = root((f) => Math.SQRT1_2 - filters(f), 1e9, 1e12);
    const reach = (level: number) => root((x) => 1 - Math.exp(-x) * (Math.cos(x) + Math.sin(x)) - level, 0, 2);
    const rise = ((reach(0.8) - reach(0.2)) * Math.SQRT2) / (2 * Math.PI * bandwidth);
    return [(rise / 10e-12) * 0.2365, bandwidth * 10e-12];
  },
  rows: [{ expected: [0.23653, 0.2365] }],
});

/** Response to a long run, to alternating symbols. */
const gains = (taps: readonly number[], mainTap: number) =>
  [0, 12.5e9].map((f) => {
    const of = (list: readonly number[], main: number) =>
      symbolSpectrum({ symbolRate: 25e9, riseTimeSeconds: 0, taps: list, mainTap: main }, Float64Array.of(f));
    return Math.hypot(...of(taps, mainTap)) / Math.hypot(...of([1], 0));
  });

checkValues({
  id: 'E-09',
  what: 'taps −0.06, 0.82, −0.12: gain at 0 Hz and at Nyquist, the one against the other in dB',
  source: 'exact',
  absoluteTolerance: 1e-5,
  printedWithin: 5e-5,
  compute: () => {
    const [dc, nyquist] = gains([-0.06, 0.82, -0.12], 1);
    return [dc, nyquist, 20 * Math.log10(dc / nyquist)];
  },
  rows: [{ expected: [0.64, 1, -3.8764] }],
});

checkValues({
  id: 'E-08',
  what: 'taps −0.1, 0.7, −0.2: levels after and in a run and before its end; de-emphasis and preshoot in dB',
  source: 'PCI-SIG base specification, 8 GT/s preset P7',
  absoluteTolerance: 1e-4,
  compute: () => {
    const symbols = [-1, -1, -1, 1, 1, 1, 1, -1, -1];
    const taps = [-0.1, 0.7, -0.2];
    // what leaves at symbol n, read off the samples that the spectrum's own delays give
    const delays = taps.map((_, k) => tapDelay(k, 1));
    const level = (n: number) => taps.reduce((sum, tap, k) => sum + tap * symbols[n - delays[k]], 0);
    const [va, vb, vc] = [level(3), level(4), level(6)];
    return [va, vb, vc, 20 * Math.log10(vb / va), 20 * Math.log10(vc / vb)];
  },
  rows: [{ expected: [0.8, 0.4, 0.6, -6.0206, 3.5218] }],
});

/** Delay of a tap in UI, from its spectrum's phase. */
function tapDelay(k: number, mainTap: number): number {
  const f = 2.5e9;
  const taps = [0, 0, 0].map((_, i) => (i === k ? 1 : 0));
  const phase = (list: readonly number[], main: number) => {
    const [re, im] = symbolSpectrum(
      { symbolRate: 25e9, riseTimeSeconds: 0, taps: list, mainTap: main },
      Float64Array.of(f),
    );
    return Math.atan2(im, re);
  };
  return Math.round(((phase([1], 0) - phase(taps, mainTap)) / (2 * Math.PI * f)) * 25e9);
}
