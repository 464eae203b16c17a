import type { Model } from '../model/types';
import type { ElementFacts } from '../networks/types';
import { SPEED_OF_LIGHT } from '../physics/constants';
import { jointPoint } from '../physics/laminate';
import { type ComputedLine, computedAt, type LineMode } from './computed-line';
import { DEFAULT_DELAY_HZ, type DeclaredLine, declaredAt, fitLoss } from './declared-line';
import type { Line } from './line';
import { endsOf, frequencyOf, hasTolerance, isPair, type LineValues, lossPoints, writtenDelay } from './written';

/** One leg's impedances in both modes: half the differential, twice the common one (a quarter of the differential by default). */
export function legOhms(
  values: LineValues,
  impedanceOhms: number,
  pair: boolean,
): { oddOhms: number; evenOhms: number } {
  if (!pair) return { oddOhms: impedanceOhms, evenOhms: impedanceOhms };
  const common = values['common-impedance']?.value ?? impedanceOhms / 4;
  return { oddOhms: impedanceOhms / 2, evenOhms: 2 * common };
}

/** A line from what is declared of it, all of its length taken together. Delay and loss must be known. */
export function declaredLine(options: {
  readonly oddOhms: number;
  readonly evenOhms: number;
  readonly points: readonly { readonly db: number; readonly hz: number }[];
  readonly skinShare: number;
  readonly delaySeconds: number;
  readonly delayHz?: number;
  readonly skewSeconds: number;
}): DeclaredLine & { skewSeconds: number } {
  const { oddOhms, evenOhms, points, skinShare, delaySeconds, delayHz, skewSeconds } = options;
  const loss =
    points.length > 0 ? fitLoss(points, skinShare) : { skinNepers: 0, linearNepers: 0, referenceHz: DEFAULT_DELAY_HZ };
  return {
    model: 'declared',
    oddOhms,
    evenOhms,
    alike: oddOhms === evenOhms,
    delaySeconds,
    delayHz: delayHz ?? loss.referenceHz,
    ...loss,
    skewSeconds,
  };
}

const NO_COPPER = { conductivity: 1, roughness: { kind: 'smooth' } } as const;

/** A line in one dielectric without copper's loss: `dk` (or a delay) with `df` and no declared loss. */
function laminateOnly(
  oddOhms: number,
  evenOhms: number,
  lengthMeters: number,
  dk: number,
  df: number,
  atHz: number,
): ComputedLine {
  const point = jointPoint(dk, atHz, df, atHz);
  const slowness = Math.sqrt(point.dk) / SPEED_OF_LIGHT;
  const mode = (ohms: number): LineMode => ({
    inductance: ohms * slowness,
    capacitance: slowness / (ohms * point.dk),
    lowerShare: 1,
    upperShare: 0,
    stripPerMeter: 0,
    lowerPlanePerMeter: 0,
    upperPlanePerMeter: 0,
    slabMeters: 1,
  });
  return {
    model: 'computed',
    lengthMeters,
    odd: mode(oddOhms),
    even: mode(evenOhms),
    alike: oddOhms === evenOhms,
    lower: [{ ...point, share: 1 }],
    upper: [],
    strip: NO_COPPER,
    lowerPlane: NO_COPPER,
    upperPlane: NO_COPPER,
  };
}

/** `skew` in seconds: a time, or a length at the segment's own delay. */
export const skewOf = ({ skew }: LineValues, secondsPerMeter: number) =>
  skew === undefined ? 0 : skew.dimension === 'length' ? skew.value * secondsPerMeter : skew.value;

/**
 * A segment that declares its impedance and delay: package, cable, trace without stackup.
 * Its loss is the declared one; without, that of `df`; without, none.
 */
export function declaredSegment(values: LineValues, model: Model, skinShare: number): Line | undefined {
  const secondsPerMeter = writtenDelay(values);
  if (!values.length || !values.impedance || secondsPerMeter === undefined) return undefined;
  const length = values.length.value;
  const legs = legOhms(values, values.impedance.value, isPair(model));
  const skewSeconds = isPair(model) ? skewOf(values, secondsPerMeter) : 0;
  const delayHz = frequencyOf(values.dk);
  if (!values.loss && values.df && values.df.value > 0) {
    const dk = (secondsPerMeter * SPEED_OF_LIGHT) ** 2;
    const atHz = frequencyOf(values.df) ?? delayHz ?? DEFAULT_DELAY_HZ;
    return { ...laminateOnly(legs.oddOhms, legs.evenOhms, length, dk, values.df.value, atHz), skewSeconds };
  }
  return declaredLine({
    ...legs,
    points: lossPoints(values.loss ?? [], model, length),
    skinShare: values['skin-share']?.value ?? skinShare,
    delaySeconds: secondsPerMeter * length,
    delayHz,
    skewSeconds,
  });
}

/** What is known of a declared line, for hovers and rules. */
export function declaredFacts(line: Line, values: LineValues, model: Model): ElementFacts {
  const { impedance, length } = values;
  const at =
    line.model === 'declared'
      ? declaredAt(line, model.nyquistFrequency)
      : computedAt(line, 'odd', model.nyquistFrequency);
  const pair = isPair(model);
  return {
    lengthMeters: length?.value,
    impedanceOhms: impedance?.value,
    commonImpedanceOhms: pair ? (values['common-impedance']?.value ?? (impedance && impedance.value / 4)) : undefined,
    impedanceRangeOhms: impedance && hasTolerance(impedance) ? endsOf(impedance) : undefined,
    delaySeconds: at.delaySeconds,
    skewSeconds: line.skewSeconds,
    construction: 'declared',
    stubs: [],
  };
}
