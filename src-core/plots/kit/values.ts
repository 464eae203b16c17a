import { show } from '../../quantity/show';

/** A value of an axis in the words of every other surface: through the one formatter. */
export function showValue(value: number, unit: string): string {
  if (!Number.isFinite(value)) return 'none';
  switch (unit) {
    case 'Hz':
      return show.frequency(value);
    case 's':
      return show.time(value);
    case 'V':
      return show.voltage(value);
    case 'dB':
      return show.loss(value);
    case 'ohm':
      return show.impedance(value);
    case 'UI':
      return show.unitIntervals(value);
    default:
      return `${Number(value.toPrecision(4))}${unit === '' ? '' : ` ${unit}`}`;
  }
}
