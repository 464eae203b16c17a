import type { Dimension, ElementKindName, Quantity } from '../../schemas/format/types';
import type { AnyElement, Foil, Material, Model, Stackup, StackupLayer } from '../model/types';
import type { Network, NetworkContext, Prepared } from '../networks/types';
import { elementKinds } from './index';

/** Small makers of what the elements' tests need, in SI numbers: no text, no files. */

export const quantity = (value: number, dimension: Dimension, more: Partial<Quantity> = {}): Quantity => ({
  value,
  dimension,
  text: `${value}`,
  unit: '',
  plus: 0,
  minus: 0,
  threeSigma: false,
  ...more,
});
export const meters = (value: number, tolerance = 0) =>
  quantity(value, 'length', { plus: tolerance, minus: tolerance });
export const ohms = (value: number, tolerance = 0) =>
  quantity(value, 'impedance', { plus: tolerance, minus: tolerance });
export const seconds = (value: number) => quantity(value, 'time');
export const secondsPerMeter = (value: number) => quantity(value, 'delayPerLength');
export const dbPerMeter = (value: number, at: number) => quantity(value, 'lossPerLength', { at });
export const db = (value: number, at: number) => quantity(value, 'loss', { at });
export const farads = (value: number) => quantity(value, 'capacitance');
export const ratio = (value: number, at?: number) => quantity(value, 'ratio', at === undefined ? {} : { at });

export const model = (more: Partial<Model> = {}): Model =>
  ({
    signalling: 'differential',
    referenceOhms: 100,
    nyquistFrequency: 12.890625e9,
    symbolRate: 25.78125e9,
    temperatureCelsius: 20,
    ...more,
  }) as Model;
export const singleEnded = model({ signalling: 'single-ended', referenceOhms: 50 });

export const material = (dk: number, df = 0, inPlane = dk): Material => ({
  name: 'material',
  dkThrough: { value: dk, atHz: 10e9 },
  dkInPlane: { value: inPlane, atHz: 10e9 },
  df: { value: df, atHz: 10e9 },
});
export const smooth: Foil = { conductivity: 5.8e7, roughness: { kind: 'smooth' } };

/** `['L1', 45e-6]` copper, `['L2*', 17e-6]` a plane, `[95e-6]` dielectric; top to bottom. */
export function stackup(
  rows: readonly (readonly [string, number] | readonly [number])[],
  laminate = material(3.6),
  foil = smooth,
  drillRules: Stackup['drillRules'] = {},
): Stackup {
  const place = { file: 'test.parts.yaml', path: [] };
  const layers = rows.map((row, i): StackupLayer => {
    if (row.length === 1) {
      return { type: 'dielectric', name: `d${i}`, thicknessMeters: row[0], material: laminate, place };
    }
    const name = row[0].replace('*', '');
    return { type: 'copper', name, thicknessMeters: row[1], plane: row[0].endsWith('*'), foil, place };
  });
  return { name: 'main', place, layers, drillRules };
}

export const element = (
  kind: ElementKindName,
  values: Record<string, unknown>,
  more: Partial<AnyElement> = {},
): AnyElement =>
  ({
    kind,
    name: kind,
    index: 0,
    place: { file: 'test.channel.yaml', path: ['path', 0] },
    values,
    places: {},
    derived: {},
    reversed: false,
    active: false,
    incomplete: false,
    ...more,
  }) as AnyElement;

/** What an element's kind prepares; throws where that is nothing. */
export function prepared(of: AnyElement, inModel = model()): Prepared {
  const found = elementKinds[of.kind].prepare(of, { model: inModel, touchstone: () => undefined });
  if (!found) throw new Error(`The ${of.kind} cannot be prepared`);
  return found;
}

export function networkOf(of: AnyElement, frequencies: Float64Array, inModel = model()): Network {
  const context: NetworkContext = {
    frequencies,
    referenceOhms: inModel.referenceOhms,
    singleEnded: inModel.signalling === 'single-ended',
  };
  return elementKinds[of.kind].network(prepared(of, inModel).parameters, context);
}

/** From 0 in equal steps. */
export const grid = (stepHz: number, points: number) => Float64Array.from({ length: points }, (_, i) => i * stepHz);
