import { reportedByStages } from './reported';
import type { Rule } from './types';

export const signalOnPlane: Rule = {
  name: 'signal-on-plane',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A trace on a copper layer that is declared \`plane: true\`. A plane carries no signal: it is what the traces above and below it refer to.`,
  bad: 'path: [{ via: dive, part: board.hole, to: L2 }, { trace: run, stackup: board.main, layer: L2, length: 100 mm, impedance: 100 ohm }]',
  good: 'path: [{ via: dive, part: board.hole, to: L3 }]',
  check: reportedByStages,
};
