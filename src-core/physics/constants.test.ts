import { checkValues } from '../../test/check-values';
import { DB_PER_NEPER, EPSILON_0, ETA_0, MU_0, SPEED_OF_LIGHT } from './constants';

checkValues({
  id: 'M-01',
  what: 'constants: c, μ0 in µH/m, ε0 in pF/m, η0',
  source: 'CODATA 2018',
  relativeTolerance: 1e-6,
  compute: () => [SPEED_OF_LIGHT, MU_0 * 1e6, EPSILON_0 * 1e12, ETA_0],
  rows: [{ expected: [299792458, 1.256637, 8.854188, 376.7303] }],
});

checkValues({
  id: 'T-29',
  what: 'decibels in a neper',
  source: '20/ln 10, exact',
  relativeTolerance: 1e-6,
  compute: () => DB_PER_NEPER,
  rows: [{ expected: 8.68589 }],
});

checkValues({
  id: 'T-25',
  what: 'delay per inch and per millimetre, ps',
  source: '√ε/c, exact',
  relativeTolerance: 1e-5,
  compute: ({ dk, meters }) => ((Math.sqrt(dk) * meters) / SPEED_OF_LIGHT) * 1e12,
  rows: [
    { dk: 1, meters: 0.0254, expected: 84.725 },
    { dk: 4, meters: 0.0254, expected: 169.451 },
    { dk: 3.6, meters: 0.0254, expected: 160.755 },
    { dk: 1, meters: 0.001, expected: 3.33564 },
  ],
});
