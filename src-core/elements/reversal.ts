import type { ElementKind, Network, TwoPort } from '../networks/types';

/** What a kind's `prepare` found, and whether it is placed the other way round. */
interface Placed<P> {
  readonly of: P;
  readonly reversed: boolean;
}

/** Any kind, placed the other way round where the element says `reversed: true`: the only code that knows of it. */
export function reversible<P>({ prepare, network }: ElementKind<P>): ElementKind<Placed<P>> {
  return {
    prepare(element, context) {
      const prepared = prepare(element, context);
      return prepared && { ...prepared, parameters: { of: prepared.parameters, reversed: element.reversed } };
    },
    network: ({ of, reversed }, context) => (reversed ? turned(network(of, context)) : network(of, context)),
  };
}

/** Both ports of each mode exchanged. */
export function turned({ differential, common, full }: Network): Network {
  const other = common && (common === differential ? undefined : turnedBlocks(common, 2));
  const own = turnedBlocks(differential, 2);
  return {
    differential: own,
    ...(common && { common: other ?? own }),
    ...(full && { full: turnedBlocks(full, 4) }),
  };
}

/** Matrices of `ports` ports, row by row: the halves of rows and of columns exchanged. */
function turnedBlocks(s: Float64Array, ports: number): TwoPort {
  const out = new Float64Array(s.length);
  const size = 2 * ports * ports;
  for (let at = 0; at < s.length; at += size) {
    for (let row = 0; row < ports; row++) {
      for (let column = 0; column < ports; column++) {
        const from = at + 2 * (((row + ports / 2) % ports) * ports + ((column + ports / 2) % ports));
        const to = at + 2 * (row * ports + column);
        out[to] = s[from];
        out[to + 1] = s[from + 1];
      }
    }
  }
  return out;
}
