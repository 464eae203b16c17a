import { reportedByStages } from './reported';
import type { Rule } from './types';

export const impedanceTarget: Rule = {
  name: 'impedance-target',
  severity: 'warning',
  reads: 'networks',
  options: {},
  doc: `A trace gives its width (and gap) and an \`impedance\` as well: the geometry is computed and the impedance is its target, and the two differ by more
than the target's tolerance. Planning estimates come from closed forms with their own error of a few per cent; without a tolerance written,
that much is allowed. Change the width, or the target.`,
  bad: 'path: [{ trace: run, stackup: board.main, layer: L3, length: 100 mm, width: 180 um, gap: 250 um, impedance: 100 ohm ± 5% }]',
  good: 'path: [{ trace: run, stackup: board.main, layer: L3, length: 100 mm, width: 110 um, gap: 165 um }]',
  check: reportedByStages,
};
