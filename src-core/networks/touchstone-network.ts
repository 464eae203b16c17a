import { networkOf, toMixedMode } from './mixed-mode';
import { renormalise } from './renormalise';
import { resample } from './resample';
import type { TouchstoneData } from './touchstone-types';
import type { Network, NetworkContext, TwoPort } from './types';

/** Which ports of a file stand on which side, from 1, the positive leg first: two a side of a pair, one where the file is one conductor. */
export interface PortMap {
  readonly enter: readonly number[];
  readonly leave: readonly number[];
}

export interface Placement extends PortMap {
  /** Placed the other way round. */
  readonly reversed?: boolean;
}

/**
 * A file's data as an element's network at any frequencies (see `resample` for what lies between and beyond its own).
 * Two ports a side: a pair, in mixed mode. One port a side in a pair: each leg is one copy, uncoupled. No port that leaves: the file is
 * a branch, in parallel with each leg. Ports left out end in the file's reference.
 * @throws RangeError where a port does not exist or is named twice, or the sides have unlike numbers of ports
 */
export function touchstoneNetwork(data: TouchstoneData, placement: Placement, context: NetworkContext): Network {
  const problem = placementProblem(data.ports, placement);
  if (problem !== undefined) throw new RangeError(problem);
  const { enter, leave, reversed } = placement;
  const order = reversed && leave.length > 0 ? [...leave, ...enter] : [...enter, ...leave];
  const legOhms = context.singleEnded ? context.referenceOhms : context.referenceOhms / 2;
  const picked = pickPorts(resample(data, context.frequencies), data.ports, order);
  const s = renormalise(
    picked,
    order.map((port) => data.referenceOhms[port - 1]),
    order.map(() => legOhms),
  );
  if (enter.length === 2) return networkOf(toMixedMode(s));
  const leg: TwoPort = leave.length === 0 ? branch(s) : s;
  return context.singleEnded ? { differential: leg } : { differential: leg, common: leg };
}

/** What is wrong with a placement, in words; undefined if nothing. */
export function placementProblem(ports: number, { enter, leave }: PortMap): string | undefined {
  const all = [...enter, ...leave];
  const missing = all.find((port) => !Number.isInteger(port) || port < 1 || port > ports);
  if (missing !== undefined)
    return `The file has ${ports === 1 ? 'one port' : `ports 1 to ${ports}`}; there is no port ${missing}.`;
  if (new Set(all).size < all.length) return 'A port can stand in one place only.';
  if (leave.length === 0) return enter.length === 1 ? undefined : 'A branch has one port.';
  if (enter.length !== leave.length) return 'As many ports have to enter as leave.';
  return undefined;
}

/** Rows and columns of the ports named, in their order; the others see no incoming wave, since they end in their reference. */
function pickPorts(s: Float64Array, ports: number, order: readonly number[]): Float64Array {
  const n = order.length;
  const points = s.length / (2 * ports * ports);
  const out = new Float64Array(2 * n * n * points);
  for (let i = 0, to = 0; i < points; i++) {
    for (const row of order) {
      for (const column of order) {
        const from = 2 * (i * ports * ports + (row - 1) * ports + column - 1);
        out[to++] = s[from];
        out[to++] = s[from + 1];
      }
    }
  }
  return out;
}

/** A one-port of reflection Γ in parallel with the conductor: s21 = 2(1 + Γ)/(3 + Γ), s11 = −(1 − Γ)/(3 + Γ). */
function branch(reflection: Float64Array): TwoPort {
  const points = reflection.length / 2;
  const out: TwoPort = new Float64Array(8 * points);
  for (let i = 0; i < points; i++) {
    const re = reflection[2 * i];
    const im = reflection[2 * i + 1];
    const scale = 1 / ((3 + re) ** 2 + im * im);
    // (1 + Γ)/(3 + Γ), then s11 = s21 − 1
    const throughRe = 2 * ((1 + re) * (3 + re) + im * im) * scale;
    const throughIm = 2 * (im * (3 + re) - (1 + re) * im) * scale;
    for (const at of [8 * i + 2, 8 * i + 4]) {
      out[at] = throughRe;
      out[at + 1] = throughIm;
    }
    for (const at of [8 * i, 8 * i + 6]) {
      out[at] = throughRe - 1;
      out[at + 1] = throughIm;
    }
  }
  return out;
}
