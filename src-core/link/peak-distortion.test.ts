import { checkValues } from '../../test/check-values';
import { eyeColumns } from './eye-columns';
import { eyeHeight } from './eye-measures';
import { jitterNodes } from './jitter';
import { levelsOf } from './levels';

/**
 * A one-pole channel's response to one symbol, sampled at its end: (1 − a) aⁿ.
 * Terms that fall between bins reach up to a bin further each: four bins of a four-thousandth of the main cursor, on both sides.
 */
function onePoleEye(a: number, modulation: 'NRZ' | 'PAM4'): number {
  const samplesPerUi = 32;
  const pulse = Float64Array.from({ length: 64 * samplesPerUi }, (_, n) => {
    const uis = n / samplesPerUi;
    return uis <= 1 ? 1 - a ** uis : (1 - a) * a ** (uis - 1);
  });
  const levels = levelsOf(modulation);
  const columns = eyeColumns({ pulse, samplesPerUi, mainIndex: samplesPerUi, dfeTaps: [] }, levels, 0);
  // symbols of ±1 where ours are ±1/2; ten symbols make the worst pattern but for 1e-6, and they meet once in 1,000
  return 2 * eyeHeight({ columns, levels, nodes: jitterNodes(0, 0, columns.perUi), droopVolts: 0, targetBer: 1e-12 });
}

checkValues({
  id: 'D-07',
  what: 'one-pole channel, NRZ: worst eye 2(1 − 2a) for a of 0.25; for 0.1 it is that of D-08',
  source: 'derived, exact',
  absoluteTolerance: 3e-3,
  compute: ({ a }) => onePoleEye(a, 'NRZ'),
  rows: [
    { a: 0.25, expected: 1 },
    { a: 0.1, expected: 1.6 },
    { a: 0.51, expected: 0 },
  ],
});

checkValues({
  id: 'D-08',
  what: 'one-pole channel, PAM4: worst inner eye (2/3)(1 − 4a)',
  source: 'derived, exact',
  absoluteTolerance: 3e-3,
  compute: ({ a }) => onePoleEye(a, 'PAM4'),
  rows: [{ a: 0.1, expected: 0.4 }],
});

checkValues({
  id: 'D-15',
  what: 'level spacing of PAM4 below that of NRZ in dB; its symbol errors from Q(3.719016) each tail, in 1e-4, and half as many bit errors',
  source: 'exact',
  relativeTolerance: 1e-4,
  compute: () => {
    const spacing = (modulation: 'NRZ' | 'PAM4') => {
      const [[lower, upper]] = levelsOf(modulation).eyes;
      return upper - lower;
    };
    const { eyes, bitErrorShare } = levelsOf('PAM4');
    // both tails into each of three eyes
    const bits = bitErrorShare * 2 * 1e-4 * eyes.length;
    return [20 * Math.log10(spacing('NRZ') / spacing('PAM4')), 2 * bits * 1e4];
  },
  rows: [{ expected: [9.54243, 1.5] }],
});
