import { format } from 'd3-format';
import { scaleLinear } from 'd3-scale';
import type { Axis } from '../types';
import { textWidth } from './svg';

/** An axis laid onto pixels: ticks in one prefix, none of them touching its neighbour. */
export interface LaidAxis {
  readonly domain: readonly [number, number];
  /** `Frequency, GHz` */
  readonly title: string;
  readonly ticks: readonly { readonly value: number; readonly pixel: number; readonly text: string }[];
  toPixel(value: number): number;
  fromPixel(pixel: number): number;
}

const prefixes: readonly (readonly [number, string])[] = [
  [1e12, 'T'],
  [1e9, 'G'],
  [1e6, 'M'],
  [1e3, 'k'],
  [1, ''],
  [1e-3, 'm'],
  [1e-6, 'µ'],
  [1e-9, 'n'],
  [1e-12, 'p'],
  [1e-15, 'f'],
];
const withPrefix = new Set(['Hz', 's', 'V', 'm', 'F', 'H']);

/** The unit and its size that suits values up to `largest`: 12.9e9 Hz gives GHz, 1e9. */
export function prefixFor(unit: string, largest: number): { unit: string; size: number } {
  if (!withPrefix.has(unit) || !(largest > 0)) return { unit, size: 1 };
  const [size, prefix] = prefixes.find(([at]) => largest >= at * 0.9999999) ?? prefixes[prefixes.length - 1];
  return { unit: prefix + unit, size };
}

/** A domain that can be drawn: finite, of some width, in ascending order. */
export function usableDomain([from, to]: readonly [number, number]): [number, number] {
  if (!Number.isFinite(from) || !Number.isFinite(to)) return [0, 1];
  if (to - from > 1e-12 * Math.max(Math.abs(from), Math.abs(to))) return [from, to];
  const half = Math.abs(from) > 0 ? Math.abs(from) / 10 : 0.5;
  return [from - half, from + half];
}

/**
 * @param range pixels of the domain's start and end; a vertical axis runs from the bottom upwards
 * @param spacing least distance in pixels between neighbouring ticks of a vertical axis; a horizontal one measures its labels
 */
export function layAxis(
  axis: Axis,
  zoom: readonly [number, number] | undefined,
  range: readonly [number, number],
  { direction, fontSize }: { direction: 'horizontal' | 'vertical'; fontSize: number },
): LaidAxis {
  const domain = usableDomain(zoom ?? axis.domain);
  const { unit, size } = prefixFor(axis.unit, Math.max(Math.abs(domain[0]), Math.abs(domain[1])));
  const scale = scaleLinear()
    .domain([domain[0] / size, domain[1] / size])
    .range(range as [number, number]);
  return {
    domain,
    title: unit === '' ? axis.label : `${axis.label}, ${unit}`,
    ticks: ticksOf(scale, Math.abs(range[1] - range[0]), direction, fontSize).map(({ value, text }) => ({
      value: value * size,
      pixel: scale(value),
      text,
    })),
    toPixel: (value) => scale(value / size),
    fromPixel: (pixel) => scale.invert(pixel) * size,
  };
}

function ticksOf(
  scale: { ticks(count: number): number[] },
  length: number,
  direction: 'horizontal' | 'vertical',
  fontSize: number,
) {
  for (let count = Math.max(2, Math.floor(length / (direction === 'horizontal' ? 55 : 32))); count >= 1; count--) {
    const values = scale.ticks(count);
    const texts = labels(values);
    const widest = Math.max(0, ...texts.map((text) => textWidth(text, fontSize)));
    const needed = direction === 'horizontal' ? widest + 10 : fontSize * 1.4;
    if (values.length * needed <= length || count === 1) return values.map((value, i) => ({ value, text: texts[i] }));
  }
  return [];
}

/** All with the same decimals, as few as keep them apart. */
function labels(values: readonly number[]): string[] {
  const step = values.length > 1 ? Math.abs(values[1] - values[0]) : Math.abs(values[0] ?? 1);
  const decimals = step > 0 ? Math.min(15, Math.max(0, Math.ceil(-Math.log10(step) - 1e-9))) : 0;
  const show = format(`.${decimals}f`);
  return values.map((value) => show(Math.abs(value) < step * 1e-9 ? 0 : value));
}
