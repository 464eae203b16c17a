import { reportedByStages } from './reported';
import type { Rule } from './types';

export const internal: Rule = {
  name: 'internal',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `Something in Lanewright itself broke. It is told where it did, the rest is still judged, and nothing on disk is changed. Please report it with
the file, or the smallest part of it that still does it.`,
  bad: '',
  good: '',
  check: reportedByStages,
};
