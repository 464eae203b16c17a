import type { PortMap } from './touchstone-network';
import type { TouchstoneData } from './touchstone-types';

/** How the four ports of a pair can be joined in twos. */
const matchings = [
  [[1, 2], [3, 4]],
  [[1, 3], [2, 4]],
  [[1, 4], [2, 3]],
] as const; // biome-ignore format: a table

/** The best matching has to stand out by this much, else the data do not say. */
const clearDb = 6;
/** A through below this in the lowest tenth of the band is a capacitor's or a notch's: then the whole band is asked. */
const weakDb = -20;

/**
 * Which ports of a four-port go through to which: of the three ways to join them in twos the one with the largest mean |S| over the lowest
 * tenth of the band. undefined where it does not stand out by 6 dB. Which end is left and which conductor positive, no file says:
 * port 1 and its neighbour enter, the lower number is positive.
 * Source: the two numbering habits of the trade; check values "Four-port numbering".
 */
export function portMapOf(data: TouchstoneData): PortMap | undefined {
  if (data.ports !== 4) return undefined;
  const points = data.frequencies.length;
  const lowest = Math.max(1, Math.ceil(points / 10));
  let ranked = rank(data, lowest);
  if (ranked[0].weakestDb < weakDb) ranked = rank(data, points);
  const [best, next] = ranked;
  if (!(best.meanDb >= next.meanDb + clearDb)) return undefined;
  const [first, second] = best.pairs;
  return { enter: [first[0], second[0]], leave: [first[1], second[1]] };
}

/** The map that goes through, as near to the written one as can be: its ports enter where they did, if they are not two ends of one conductor. */
export function mendedMap(written: PortMap, through: PortMap): PortMap {
  const partner = (port: number) => {
    const at = through.enter.indexOf(port);
    return at >= 0 ? through.leave[at] : through.enter[through.leave.indexOf(port)];
  };
  const [p, n] = written.enter;
  if (partner(p) !== n) return { enter: [p, n], leave: [partner(p), partner(n)] };
  return through;
}

/** Whether a map's conductors are those that go through. */
export function goesThrough(written: PortMap, through: PortMap): boolean {
  const mended = mendedMap(written, through);
  return [0, 1].every((leg) => mended.enter[leg] === written.enter[leg] && mended.leave[leg] === written.leave[leg]);
}

function rank({ s }: TouchstoneData, points: number) {
  const meanDb = (a: number, b: number) => {
    let sum = 0;
    for (let i = 0; i < points; i++) {
      const at = 32 * i + 2 * ((b - 1) * 4 + a - 1);
      sum += Math.hypot(s[at], s[at + 1]);
    }
    return 20 * Math.log10(Math.max(sum / points, 1e-10));
  };
  const amplitude = (db: number) => 10 ** (db / 20);
  return matchings
    .map((pairs) => {
      const each = pairs.map(([a, b]) => meanDb(a, b));
      const mean = 20 * Math.log10((amplitude(each[0]) + amplitude(each[1])) / 2);
      return { pairs, meanDb: mean, weakestDb: Math.min(...each) };
    })
    .sort((a, b) => b.meanDb - a.meanDb);
}
