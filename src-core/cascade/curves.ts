import type { Analysis } from '../analysis';
import { fullOf } from '../networks/mixed-mode';
import type { Network } from '../networks/types';
import { networkAt } from './network-at';

export interface CurvesOptions {
  /** Positions in path, inclusive; all of path by default. */
  readonly between?: readonly [number, number];
  /** Each element for itself. */
  readonly elements?: boolean;
  /** Hz; the analysis's grid by default. */
  readonly frequencies?: Float64Array;
}

export interface Curves {
  readonly frequencies: Float64Array;
  readonly referenceOhms: number;
  readonly singleEnded: boolean;
  readonly parts: readonly { readonly name: string; readonly network: Network; readonly columns: readonly Column[] }[];
}

export interface Column {
  readonly name: string;
  readonly values: Float64Array;
}

/** The numbers behind the plots, evaluated at just the frequencies asked for. Terminations are no part of them. */
export function curvesOf(
  { networks, cascade }: Analysis,
  { between, elements, frequencies }: CurvesOptions = {},
): Curves {
  if (!networks || !cascade) throw new RangeError('The channel is not computed: it has no curves.');
  const [from, to] = between ?? [0, networks.elements.length - 1];
  const context = { ...networks.context, ...(frequencies && { frequencies }) };
  const partOf = (name: string, network: Network) => ({
    name,
    network,
    columns: columnsOf(network, context.singleEnded),
  });
  const ranges = elements
    ? networks.elements.slice(from, to + 1).map((_, i): [number, number] => [from + i, from + i])
    : [[from, to] as const];
  const parts = ranges.map(([first, last]) => {
    const network = frequencies ? networkAt(networks, frequencies, [first, last]) : cascade.between(first, last);
    const names = [networks.elements[first]?.element.name, networks.elements[last]?.element.name];
    return partOf(first === last ? (names[0] ?? 'path') : `${names[0]} to ${names[1]}`, network);
  });
  return {
    frequencies: context.frequencies,
    referenceOhms: context.referenceOhms,
    singleEnded: context.singleEnded,
    parts,
  };
}

/** dB of the amplitudes first, then re and im of each parameter; conversion between the modes only where there is some. */
function columnsOf(network: Network, singleEnded: boolean): readonly Column[] {
  const prefix = singleEnded ? 'S' : 'SDD';
  const own = [
    ...decibels(network.differential, prefix),
    ...twoPortColumns(network.differential, prefix),
    ...(network.common ? twoPortColumns(network.common, 'SCC') : []),
  ];
  return network.full ? [...own, ...conversionColumns(fullOf(network))] : own;
}

const entries = ['11', '12', '21', '22'] as const;

const column = (name: string, s: Float64Array, stride: number, at: number): Column => ({
  name,
  values: Float64Array.from({ length: s.length / stride }, (_, i) => s[i * stride + at]),
});

function decibels(s: Float64Array, prefix: string): Column[] {
  return entries.map((entry, k) => ({
    name: `${prefix}${entry}_dB`,
    // 200 dB is far below any noise; a zero would be infinite
    values: Float64Array.from(
      { length: s.length / 8 },
      (_, i) => 20 * Math.log10(Math.max(1e-10, Math.hypot(s[8 * i + 2 * k], s[8 * i + 2 * k + 1]))),
    ),
  }));
}

const twoPortColumns = (s: Float64Array, prefix: string): Column[] =>
  entries.flatMap((entry, k) => [
    column(`${prefix}${entry}_re`, s, 8, 2 * k),
    column(`${prefix}${entry}_im`, s, 8, 2 * k + 1),
  ]);

/** Out of which mode into which: SCD21 is differential in on the transmitter side, common out on the receiver side. */
function conversionColumns(full: Float64Array): Column[] {
  return entries.flatMap((entry) => {
    const [out, into] = [Number(entry[0]) - 1, Number(entry[1]) - 1];
    const commonOut = 8 * (2 * out + 1) + 4 * into;
    const differentialOut = 16 * out + 4 * into + 2;
    return [
      column(`SCD${entry}_re`, full, 32, commonOut),
      column(`SCD${entry}_im`, full, 32, commonOut + 1),
      column(`SDC${entry}_re`, full, 32, differentialOut),
      column(`SDC${entry}_im`, full, 32, differentialOut + 1),
    ];
  });
}
