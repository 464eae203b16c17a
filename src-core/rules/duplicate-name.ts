import { reportedByStages } from './reported';
import type { Rule } from './types';

export const duplicateName: Rule = {
  name: 'duplicate-name',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `Two elements or limits of one file with the same name. They share one name space, since limits, waivers and reviews speak of them by name.`,
  bad: 'limits: [{ eye: run, height: 40 mV, width: 0.3 UI }]',
  good: 'limits: [{ eye: wide, height: 40 mV, width: 0.3 UI }]',
  check: reportedByStages,
};
