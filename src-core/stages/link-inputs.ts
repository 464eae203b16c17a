import type { Model } from '../model/types';

/** What of the model the stages of time and link read, beside the cascade: an edit of a limit, a title or a name is not among it. */
export function linkInputs(model: Model): unknown {
  const { modulation, symbolRate, targetBer, longestRun, signalling, referenceOhms, transmitter, receiver, elements } =
    model;
  const capacitors = elements.filter(({ kind }) => kind === 'capacitor');
  const droops = capacitors.map(({ name, values, incomplete, includedIn }) => ({
    name,
    values,
    incomplete,
    includedIn,
  }));
  return { modulation, symbolRate, targetBer, longestRun, signalling, referenceOhms, transmitter, receiver, droops };
}
