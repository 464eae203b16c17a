import { type Eye, openingAt, tailLogs } from './eye-measures';
import { gaussianTail } from './gaussian';
import { jittered } from './jitter';
import type { EyeDensity } from './types';

const rows = 160;
/** Thresholds between the middle of an eye and its level at which the contour's bit errors are computed. */
const contourSteps = 32;
const floorLog10 = -20;
/** Natural logarithm of a bin that holds nothing. */
const emptyLog = Math.log(1e-40);
/** Errors as frequent as this need no better count. */
const common = 0.02;

/**
 * The statistical eye as a picture: probability a bin, and the contour at the target bit error ratio.
 * Both are computed when first asked for: the figures need neither.
 */
export function eyeDensity(eye: Eye): EyeDensity {
  const { columns } = eye;
  const phases = columns.perUi;
  const top = reachVolts(eye);
  let log10: Float32Array | undefined;
  let openings: EyeDensity['openings'] | undefined;
  return {
    phases,
    voltages: rows,
    lowestVolts: -top,
    highestVolts: top,
    get log10() {
      return (log10 ??= densityOf(eye, top));
    },
    get openings() {
      return (openings ??= openingsOf(eye));
    },
  };
}

/** Half the height of the picture: largest level and as much interference and noise as is met once in 1e12 symbols or so. */
function reachVolts({ columns, droopVolts }: Eye): number {
  const { centre, perUi, mainCursors, tails, binVolts } = columns;
  let reach = 0;
  for (let c = centre - perUi / 2; c < centre + perUi / 2; c++) {
    const { half } = tails[c].density;
    let outermost = half.length - 1;
    for (let beyond = half[outermost]; outermost > 0 && beyond < 1e-12; beyond += half[outermost]) outermost--;
    const here = (outermost + 4 * tails[c].sigmaBins) * binVolts + Math.abs(mainCursors[c]) / 2 + droopVolts;
    reach = Math.max(reach, here);
  }
  return 1.04 * reach || 1e-6;
}

/**
 * Probabilities of voltage bins by phase, row by row from the lowest voltage. The picture is even about 0, so that its upper half is computed.
 * A bin of interference adds the share of a Gaussian that falls into a row: only non-negative terms.
 */
function densityOf(eye: Eye, top: number): Float32Array {
  const { columns, nodes, levels } = eye;
  const { centre, perUi, tails, mainCursors, binVolts } = columns;
  const rowBins = (2 * top) / rows / binVolts;
  const all = levels.eyes.flat().filter((level, i, list) => list.indexOf(level) === i);
  const logs = Array.from({ length: rows / 2 }, () => new Float64Array(tails.length).fill(emptyLog));
  for (let c = 0; c < tails.length; c++) {
    const { density, sigmaBins } = tails[c];
    const { half } = density;
    const reach = Math.ceil(9 * sigmaBins + rowBins / 2) + 1;
    const share = rowShare(sigmaBins, rowBins, reach);
    const outermost = half.length - 1;
    const both = new Float64Array(2 * half.length - 1);
    for (let i = 0; i <= outermost; i++) both[outermost + i] = both[outermost - i] = half[i];
    for (let r = 0; r < rows / 2; r++) {
      let sum = 0;
      for (const level of all) {
        const x = Math.round((r + 0.5) * rowBins - (level * mainCursors[c]) / binVolts);
        const from = Math.max(0, x - reach + outermost);
        const to = Math.min(2 * outermost, x + reach + outermost);
        const shift = reach - x - outermost;
        for (let i = from; i <= to; i++) sum += both[i] * share[i + shift];
      }
      if (sum > 1e-39) logs[r][c] = Math.log(sum / all.length);
    }
  }
  const out = new Float32Array(rows * perUi);
  for (let r = 0; r < rows / 2; r++) {
    for (let i = 0; i < perUi; i++) {
      const value = Math.max(floorLog10, Math.log10(jittered(logs[r], centre - perUi / 2 + i, nodes)));
      out[(rows / 2 + r) * perUi + i] = value;
      out[(rows / 2 - 1 - r) * perUi + i] = value;
    }
  }
  return out;
}

/** Share of a Gaussian that falls into a row whose middle is `k - reach` bins away, at k. */
function rowShare(sigmaBins: number, rowBins: number, reach: number): Float64Array {
  const above = (bins: number) => (sigmaBins > 0 ? gaussianTail(bins / sigmaBins) : bins < 0 ? 1 : bins > 0 ? 0 : 0.5);
  const out = new Float64Array(2 * reach + 1);
  for (let k = 0; k <= reach; k++) {
    out[reach + k] = out[reach - k] = above(k - rowBins / 2) - above(k + rowBins / 2);
  }
  return out;
}

/** For each eye, lower and upper edge at each phase; at the sampling instant exactly those of the figure. */
function openingsOf(eye: Eye): EyeDensity['openings'] {
  const { columns, levels, targetBer } = eye;
  const { centre, perUi, mainCursors } = columns;
  const wanted = targetBer / (levels.bitErrorShare * levels.eyes.length);
  const upward = levels.eyes.slice(Math.floor(levels.eyes.length / 2)).map((pair) => {
    const middle = ((pair[0] + pair[1]) / 2) * mainCursors[centre];
    const half = (Math.max(...mainCursors) * (pair[1] - pair[0])) / 2;
    const edges = { lower: new Float64Array(perUi), upper: new Float64Array(perUi) };
    const even = pair[0] + pair[1] === 0;
    for (const direction of even ? [1] : [-1, 1]) {
      const steps = Array.from({ length: contourSteps + 1 }, (_, s) => middle + (direction * half * s) / contourSteps);
      const side = direction > 0 ? edges.upper : edges.lower;
      walkOutwards(eye, pair, steps, wanted, side);
      const exact = openingAt(eye, pair);
      side[perUi / 2] = exact[direction > 0 ? 1 : 0];
    }
    return even ? { lower: edges.upper.map((v) => -v), upper: edges.upper } : edges;
  });
  const downward = upward
    .slice(1)
    .reverse()
    .map(({ lower, upper }) => ({ lower: upper.map((v) => -v), upper: lower.map((v) => -v) }));
  return [...downward, ...upward];
}

/**
 * Where, walking outwards from the middle of an eye, the errors pass what is wanted, at each phase; straight in the logarithm between steps.
 * The middle where it is shut. Columns in which errors are common need no second look: further out there are more.
 */
function walkOutwards(
  eye: Eye,
  pair: readonly [number, number],
  steps: readonly number[],
  wanted: number,
  out: Float64Array,
): void {
  const { centre, perUi } = eye.columns;
  const inside = new Float64Array(perUi);
  const open = new Uint8Array(perUi).fill(1);
  const whole = [0, eye.columns.tails.length - 1] as const;
  const enough = Math.log(Math.max(common, 4 * wanted));
  let logs: Float64Array | undefined;
  for (let s = 0; s < steps.length; s++) {
    logs = tailLogs(eye, pair, steps[s], whole, logs && { logs, enough });
    let left = 0;
    for (let i = 0; i < perUi; i++) {
      if (!open[i]) continue;
      const errors = jittered(logs, centre - perUi / 2 + i, eye.nodes);
      const log = Math.log(Math.max(errors, Number.MIN_VALUE));
      if (errors <= wanted) {
        inside[i] = log;
        out[i] = steps[s];
        left++;
        continue;
      }
      open[i] = 0;
      if (s === 0) out[i] = steps[0];
      else out[i] += ((Math.log(wanted) - inside[i]) / (log - inside[i])) * (steps[s] - steps[s - 1]);
    }
    if (left === 0) return;
  }
}
