import type { Quantity } from '../../schemas/format/types';
import type { Model } from '../model/types';
import { show } from '../quantity/show';
import { inSi, unitNamed } from '../quantity/units';
import type { Row } from './markdown';

const SPEED_OF_LIGHT = 299792458;

/** Units that people of this trade change between. */
const UNITS: Readonly<Partial<Record<Quantity['dimension'], readonly string[]>>> = {
  length: ['mm', 'mil', 'in', 'um'],
  lossPerLength: ['dB/mm', 'dB/in', 'dB/m'],
  delayPerLength: ['ps/mm', 'ps/in', 'ns/m'],
  velocity: ['c', 'm/s'],
  capacitance: ['fF', 'pF', 'nF'],
  inductance: ['pH', 'nH'],
  conductivity: ['MS/m'],
};

const inUnit = (value: number, name: string): string => {
  const unit = unitNamed(name);
  return unit ? `${show.ratio(value / inSi('1', unit))} ${name}` : '';
};

/** A quantity in other units, and what it amounts to in this channel: one row each. */
export function conversionsOf(quantity: Quantity, model: Model): readonly Row[] {
  const { value, dimension, unit } = quantity;
  const rows: Row[] = [];
  const others = (UNITS[dimension] ?? []).filter((name) => name !== unit && reasonable(value, name));
  if (others.length > 0) rows.push(['In other units', others.map((name) => inUnit(value, name)).join(' · ')]);
  const ui = model.computable ? model.unitInterval : undefined;
  switch (dimension) {
    case 'time':
      if (ui) rows.push(['Of the unit interval', show.unitIntervals(value / ui)]);
      break;
    case 'unitInterval':
      if (ui) rows.push(['As time', show.time(value * ui)]);
      break;
    case 'frequency':
      if (value > 0) rows.push(['Period', show.time(1 / value)]);
      if (model.computable) rows.push(['Of Nyquist', show.percent(value / model.nyquistFrequency)]);
      break;
    case 'bitRate':
      if (ui)
        rows.push(['Unit interval', show.time(ui)], ['Nyquist frequency', show.frequency(model.nyquistFrequency)]);
      break;
    case 'loss':
      rows.push(['What is left of the amplitude', show.percent(10 ** (-Math.abs(value) / 20))]);
      break;
    case 'delayPerLength':
      rows.push(
        ['Effective dielectric constant', show.ratio((value * SPEED_OF_LIGHT) ** 2)],
        ['Velocity', show.velocity(1 / value)],
      );
      break;
    case 'velocity':
      if (value > 0)
        rows.push(
          ['Delay', show.delayPerLength(1 / value)],
          ['Effective dielectric constant', show.ratio((SPEED_OF_LIGHT / value) ** 2)],
        );
      break;
    case 'impedance':
      if (model.computable && value > 0)
        rows.push([
          'Reflection against the reference',
          show.ratio((value - model.referenceOhms) / (value + model.referenceOhms)),
        ]);
      break;
    default:
  }
  if (quantity.plus > 0 || quantity.minus > 0)
    rows.push(['From, to', show.rangeOf(value - quantity.minus, value + quantity.plus, dimension)]);
  if (quantity.at === 'nyquist' && model.computable)
    rows.push(['Nyquist frequency', show.frequency(model.nyquistFrequency)]);
  return rows;
}

/** Not 1e-7 in and not 4e6 um. */
function reasonable(value: number, name: string): boolean {
  const unit = unitNamed(name);
  const size = unit ? Math.abs(value / inSi('1', unit)) : 0;
  return value === 0 || (size >= 0.01 && size < 1e5);
}
