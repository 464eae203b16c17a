import type { Element, Model } from '../model/types';

/** Time constant of the series capacitors, and what the longest run of equal bits makes of it. */
export interface Droop {
  readonly timeConstantSeconds: number;
  /** Share of the level that is lost over the longest run, 0 to 1. */
  readonly share: number;
  /** Names of the capacitors. */
  readonly capacitors: readonly string[];
}

/**
 * Baseline wander from series capacitors in closed form, since their corner lies below the grid.
 * The path is a wire to them: each leg's source and load resistance R are in series with its capacitors, 1/C = Σ 1/C_i, τ = R C
 * (100 nF between two times 50 ohm: corner 1/(2πτ) = 15.9 kHz). A level held for the longest run of n UI sinks by 1 - exp(-n UI/τ).
 * Undefined without capacitors that declare a value. Loss of the path itself at low frequency is neglected; it makes τ longer.
 * Source: exact; check value N-17.
 */
export function droopOf(model: Model): Droop | undefined {
  const capacitors = model.elements.filter(
    (element): element is Element<'capacitor'> =>
      element.kind === 'capacitor' &&
      !element.incomplete &&
      element.includedIn === undefined &&
      (element.values as Element<'capacitor'>['values']).value !== undefined,
  );
  const inverse = capacitors.reduce((sum, { values }) => sum + 1 / values.value!.value, 0);
  if (capacitors.length === 0 || !(inverse > 0) || !Number.isFinite(inverse)) return undefined;
  const source = model.transmitter?.impedanceOhms ?? model.referenceOhms;
  const load = model.receiver?.impedanceOhms ?? model.referenceOhms;
  const legOhms = (source + load) / (model.signalling === 'differential' ? 2 : 1);
  const timeConstantSeconds = legOhms / inverse;
  return {
    timeConstantSeconds,
    share: -Math.expm1((-model.longestRun * model.unitInterval) / timeConstantSeconds),
    capacitors: capacitors.map(({ name }) => name),
  };
}
