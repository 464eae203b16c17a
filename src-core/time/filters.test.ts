import { checkValues } from '../../test/check-values';
import { automaticCtle, ctleResponse, ratioOfDb, receiverFilter } from './filters';

const zero = () => ({ re: 0, im: 0 });
const size = ({ re, im }: { re: number; im: number }) => Math.hypot(re, im);
const degrees = ({ re, im }: { re: number; im: number }) => (Math.atan2(im, re) * 180) / Math.PI;
const fb = 25.78125e9;
const fr = 0.75 * fb;

checkValues({
  id: 'S-06',
  what: 'Receiver filter at its bandwidth and at Nyquist: magnitude, phase in degrees',
  source: 'IEEE 802.3 100GCU reflector, messages 373 and 374, June 2012',
  relativeTolerance: 1e-5,
  compute: ({ frequencyHz }) => {
    const H = receiverFilter(frequencyHz, fr, zero());
    return [size(H), degrees(H)];
  },
  rows: [
    // at the bandwidth the phase is that of the two pole pairs, -180 degrees
    { frequencyHz: fr, expected: [Math.SQRT1_2, -180] },
    { frequencyHz: fb / 2, expected: [0.98104, -108.29] },
  ],
});

checkValues({
  id: 'S-08',
  what: 'CTLE gain in dB at 0 Hz and at Nyquist',
  source: 'IEEE 802.3 Annex 93A, form of the continuous-time filter',
  absoluteTolerance: 1e-4,
  compute: ({ gain }) =>
    [0, fb / 2].map((f) => 20 * Math.log10(size(ctleResponse(f, automaticCtle(fb), ratioOfDb(gain), 1, zero())))),
  rows: [
    { gain: 0, expected: [0, -0.9691] },
    { gain: -6, expected: [-6, -1.6737] },
    { gain: -12, expected: [-12, -1.8702] },
  ],
});

checkValues({
  id: 'E-01',
  what: 'CTLE of -6 dB: gain at 0 Hz, and boost to Nyquist in dB',
  source: 'IEEE 802.3 Annex 93A',
  absoluteTolerance: 1e-4,
  compute: () => {
    const [low, high] = [0, fb / 2].map((f) => size(ctleResponse(f, automaticCtle(fb), ratioOfDb(-6), 1, zero())));
    return [low, 20 * Math.log10(high / low)];
  },
  rows: [{ expected: [0.501187, 4.3263] }],
});
