import { reportedByStages } from './reported';
import type { Rule } from './types';

export const signalOnPlane: Rule = {
  name: 'signal-on-plane',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A trace on a copper layer that is declared \`plane: true\`. A plane carries no signal: it is what the traces above and below it refer to.`,
  bad: 'path: [{ trace: tail, stackup: board.main, layer: L2, length: 5 mm, impedance: 100 ohm }]',
  good: 'path: [{ trace: tail, stackup: board.main, layer: L1, length: 5 mm, impedance: 100 ohm }]',
  check: reportedByStages,
};
