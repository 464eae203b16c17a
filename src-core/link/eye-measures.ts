import type { EyeColumns } from './eye-columns';
import { type JitterNodes, jittered } from './jitter';
import type { Levels } from './levels';
import { lowestLog } from './noisy-tail';

/** The eye with its jitter and droop, ready to be measured. */
export interface Eye {
  readonly columns: EyeColumns;
  readonly nodes: JitterNodes;
  readonly levels: Levels;
  /** What a long run takes off each level towards the other, volts. */
  readonly droopVolts: number;
  readonly targetBer: number;
}

/**
 * Logarithm of the two tails into one eye, per column: that the upper level falls below a threshold or the lower one rises above it.
 * Droop moves each level towards the threshold.
 * @param range first and last column
 * @param nearer the same for a threshold nearer to the eye's middle: columns above `enough` there keep that
 */
export function tailLogs(
  { columns, droopVolts }: Eye,
  [low, high]: readonly [number, number],
  thresholdVolts: number,
  [from, to]: readonly [number, number] = [0, columns.tails.length - 1],
  nearer?: { readonly logs: Float64Array; readonly enough: number },
): Float64Array {
  const logs = new Float64Array(columns.tails.length).fill(lowestLog);
  for (let c = Math.max(0, from); c <= Math.min(to, logs.length - 1); c++) {
    if (nearer && nearer.logs[c] > nearer.enough) {
      logs[c] = nearer.logs[c];
      continue;
    }
    const main = columns.mainCursors[c];
    const { logAbove } = columns.tails[c];
    const falls = logAbove((high * main - droopVolts - thresholdVolts) / columns.binVolts);
    const rises = logAbove((thresholdVolts - low * main - droopVolts) / columns.binVolts);
    const [more, less] = falls > rises ? [falls, rises] : [rises, falls];
    logs[c] = less <= lowestLog ? more : more + Math.log1p(Math.exp(less - more));
  }
  return logs;
}

/** Where between two thresholds, one inside the eye and one outside, the tails reach a probability; 30 halvings. */
function edge(errors: (threshold: number) => number, inside: number, outside: number, wanted: number): number {
  let [a, b] = [inside, outside];
  for (let i = 0; i < 30; i++) {
    const middle = (a + b) / 2;
    if (errors(middle) <= wanted) a = middle;
    else b = middle;
  }
  return (a + b) / 2;
}

/** Lower and upper threshold of one eye at which the bit errors reach the target at the sampling instant; equal where it is shut. */
export function openingAt(eye: Eye, pair: readonly [number, number]): readonly [number, number] {
  const { columns, nodes, levels, targetBer } = eye;
  const main = columns.mainCursors[columns.centre];
  // bit errors were each eye as this one
  const wanted = targetBer / (levels.bitErrorShare * levels.eyes.length);
  const touched = [columns.centre + nodes.reach[0], columns.centre + nodes.reach[1]] as const;
  const errors = (threshold: number) => jittered(tailLogs(eye, pair, threshold, touched), columns.centre, nodes);
  const middle = ((pair[0] + pair[1]) / 2) * main;
  if (!(errors(middle) <= wanted)) return [middle, middle];
  const top = edge(errors, middle, pair[1] * main, wanted);
  // the middle eye is as high as it is deep
  return [pair[0] + pair[1] === 0 ? -top : edge(errors, middle, pair[0] * main, wanted), top];
}

/** Smallest height of all eyes at the sampling instant, volts peak to peak. The lowest and highest of PAM4 mirror each other. */
export function eyeHeight(eye: Eye): number {
  const heights = eye.levels.eyes.slice(Math.floor(eye.levels.eyes.length / 2)).map((pair) => {
    const [lower, upper] = openingAt(eye, pair);
    return upper - lower;
  });
  return Math.min(...heights);
}

/** Bit error ratio against phase, thresholds fixed in the middles of the eyes at the sampling instant. One UI, both ends included. */
export function bathtubOf(eye: Eye): { phaseUi: Float64Array; ber: Float64Array } {
  const { columns, nodes, levels } = eye;
  const { centre, perUi } = columns;
  const main = columns.mainCursors[centre];
  const phaseUi = Float64Array.from({ length: perUi + 1 }, (_, i) => (i - perUi / 2) / perUi);
  const ber = new Float64Array(perUi + 1);
  levels.eyes.forEach((pair, index) => {
    const mirror = levels.eyes.length - 1 - index;
    if (mirror < index) return;
    const share = levels.bitErrorShare * (mirror > index ? 2 : 1);
    const logs = tailLogs(eye, pair, ((pair[0] + pair[1]) / 2) * main);
    for (let i = 0; i <= perUi; i++) ber[i] += share * jittered(logs, centre - perUi / 2 + i, nodes);
  });
  return { phaseUi, ber };
}

/** Phases about the sampling instant at which the bathtub stays at or below the target, UI; straight in the logarithm between phases. */
export function eyeWidth({ phaseUi, ber }: { phaseUi: Float64Array; ber: Float64Array }, targetBer: number): number {
  const centre = (ber.length - 1) / 2;
  if (!(ber[centre] <= targetBer)) return 0;
  const side = (direction: 1 | -1): number => {
    for (let i = centre + direction; i >= 0 && i < ber.length; i += direction) {
      if (ber[i] <= targetBer) continue;
      const inside = Math.log(Math.max(ber[i - direction], 1e-40));
      const share = (Math.log(targetBer) - inside) / (Math.log(ber[i]) - inside);
      return Math.abs(phaseUi[i - direction]) + share * Math.abs(phaseUi[i] - phaseUi[i - direction]);
    }
    return 0.5;
  };
  return side(-1) + side(1);
}
