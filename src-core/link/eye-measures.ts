import type { EyeColumns } from './eye-columns';
import { type JitterNodes, jittered } from './jitter';
import type { Levels } from './levels';

/** Logarithm of no probability at all. */
export const never = -1e9;

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
  const logs = new Float64Array(columns.tails.length).fill(never);
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
    logs[c] = more + Math.log1p(Math.exp(less - more));
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

/** Bit error ratio at a phase, UI from the sampling instant; thresholds stay in the middles of the eyes at the sampling instant. */
function bitErrors(eye: Eye): (phaseUi: number) => number {
  const { columns, nodes, levels } = eye;
  const { centre, perUi } = columns;
  const main = columns.mainCursors[centre];
  // the lower eyes of PAM4 mirror the upper ones
  const half = levels.eyes.slice(Math.floor(levels.eyes.length / 2));
  const parts = half.map((pair) => ({
    share: levels.bitErrorShare * (pair[0] + pair[1] === 0 ? 1 : 2),
    logs: tailLogs(eye, pair, ((pair[0] + pair[1]) / 2) * main),
  }));
  return (phaseUi) =>
    parts.reduce((sum, { share, logs }) => sum + share * jittered(logs, centre + phaseUi * perUi, nodes), 0);
}

/** Bit error ratio against phase over one UI, both ends included, and how much of it stays at or below the target. */
export function bathtubOf(eye: Eye): { phaseUi: Float64Array; ber: Float64Array; widthUi: number } {
  const { perUi } = eye.columns;
  const errors = bitErrors(eye);
  const phaseUi = Float64Array.from({ length: perUi + 1 }, (_, i) => (i - perUi / 2) / perUi);
  const ber = phaseUi.map(errors);
  return { phaseUi, ber, widthUi: widthOf(errors, perUi, eye.targetBer) };
}

/** Walks outwards from the sampling instant, a column a step; the last step is halved 20 times. */
function widthOf(errors: (phaseUi: number) => number, perUi: number, targetBer: number): number {
  if (!(errors(0) <= targetBer)) return 0;
  const side = (direction: 1 | -1): number => {
    for (let i = 1; i <= perUi / 2; i++) {
      if (errors((direction * i) / perUi) <= targetBer) continue;
      let [inside, outside] = [(i - 1) / perUi, i / perUi];
      for (let n = 0; n < 20; n++) {
        const middle = (inside + outside) / 2;
        if (errors(direction * middle) <= targetBer) inside = middle;
        else outside = middle;
      }
      return inside;
    }
    return 0.5;
  };
  return side(-1) + side(1);
}
