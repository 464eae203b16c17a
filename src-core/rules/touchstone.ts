import { reportedByStages } from './reported';
import type { Rule } from './types';

export const touchstone: Rule = {
  name: 'touchstone',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A Touchstone file that cannot be read: a header that is unknown, a row with too few numbers, frequencies that do not rise. The line of the
file is told. Versions 1.0 and 1.1 are read, one to four ports.`,
  bad: 'path: [{ connector: mate, touchstone: broken.s4p, ports: { enter: [1, 3], leave: [2, 4] }, includes: [] }]',
  good: 'path: [{ connector: mate, touchstone: thru.s4p, ports: { enter: [1, 3], leave: [2, 4] }, includes: [] }]',
  check: reportedByStages,
};
