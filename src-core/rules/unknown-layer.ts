import { reportedByStages } from './reported';
import type { Rule } from './types';

export const unknownLayer: Rule = {
  name: 'unknown-layer',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A layer that the stackup of this element does not have, or an end of a via that cannot be told from its neighbours. The layers that there
are stand in the message.`,
  bad: 'path: [{ trace: tail, stackup: board.main, layer: L9, length: 5 mm, impedance: 100 ohm }]',
  good: 'path: [{ trace: tail, stackup: board.main, layer: L1, length: 5 mm, impedance: 100 ohm }]',
  check: reportedByStages,
};
