import fc from 'fast-check';
import { expect, test } from 'vitest';
import { inverseReal } from './fourier';

/** The sum as it is written, both sides of 0 Hz. */
function directly(spectrum: Float64Array, samples: number): number[] {
  return Array.from({ length: samples }, (_, n) => {
    let sum = spectrum[0];
    for (let i = 1; i < spectrum.length / 2; i++) {
      const turn = (2 * Math.PI * i * n) / samples;
      const both = 2 * i === samples ? 1 : 2;
      const im = 2 * i === samples ? 0 : spectrum[2 * i + 1];
      sum += both * (spectrum[2 * i] * Math.cos(turn) - im * Math.sin(turn));
    }
    return sum;
  });
}

test('a transform is the sum it stands for, whether the spectrum fills the record or not', () => {
  fc.assert(
    fc.property(
      fc.constantFrom(4, 8, 16, 64),
      fc.float({ min: 0, max: 1, noNaN: true }),
      fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 66, maxLength: 66 }),
      (samples, share, numbers) => {
        const given = 1 + Math.round((share * samples) / 2);
        const spectrum = Float64Array.from(numbers.slice(0, 2 * given));
        const wanted = directly(spectrum, samples);
        inverseReal(spectrum, samples).forEach((value, n) => {
          expect(value).toBeCloseTo(wanted[n], 11);
        });
      },
    ),
    { seed: 1, numRuns: 200 },
  );
});
