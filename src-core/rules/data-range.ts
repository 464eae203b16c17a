import { reportedByStages } from './reported';
import type { Rule } from './types';

export const dataRange: Rule = {
  name: 'data-range',
  severity: 'warning',
  reads: 'networks',
  options: {},
  doc: `The data of a Touchstone file ends below what the line rate needs, or begins far above 0 Hz. What is missing is continued to 0 Hz and tapered
above by the stated method, and the finding says by how much the cursors may be off because of it. Ask for data up to twice Nyquist at
least; a line rate that is only announced deserves it too.`,
  bad: 'path: [{ connector: mate, touchstone: short.s4p, ports: { enter: [1, 3], leave: [2, 4] }, includes: [] }]',
  good: 'path: [{ connector: mate, touchstone: thru.s4p, ports: { enter: [1, 3], leave: [2, 4] }, includes: [] }]',
  check: reportedByStages,
};
