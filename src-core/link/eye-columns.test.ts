import { expect, test } from 'vitest';
import { eyeColumns } from './eye-columns';
import { levelsOf } from './levels';

test('where nothing arrives but noise, the bins of the noise stay few', () => {
  const nothing = { pulse: new Float64Array(32 * 64), samplesPerUi: 32, mainIndex: 320, dfeTaps: [] };
  for (const noiseVolts of [0, 1e-6, 1e-3, 1]) {
    const { tails, binVolts } = eyeColumns(nothing, levelsOf('NRZ'), noiseVolts);
    expect(noiseVolts / binVolts).toBeLessThan(1e5);
    expect(tails.every(({ sigmaBins }) => Number.isFinite(sigmaBins))).toBe(true);
  }
});
