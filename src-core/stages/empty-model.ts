import type { Inputs } from '../analysis';
import type { Model } from '../model/types';

/** What is known of a channel of which nothing could be read. */
export const emptyModel = ({ file }: Inputs): Model => ({
  file,
  title: file,
  computable: false,
  lineRate: 0,
  modulation: 'NRZ',
  symbolRate: 0,
  nyquistFrequency: 0,
  unitInterval: 0,
  targetBer: 1e-12,
  longestRun: 0,
  signalling: 'differential',
  referenceOhms: 100,
  temperatureCelsius: 20,
  owners: [],
  elements: [],
  limits: [],
  waivers: [],
  files: [file],
  names: { parts: [], stackups: [], materials: [], foils: [] },
  reports: [],
});
