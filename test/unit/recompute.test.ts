import { execFileSync } from 'node:child_process';
import { readdirSync } from 'node:fs';
import { beforeAll, describe, expect, test } from 'vitest';
import { analyse } from '../../src-core/analyse';
import type { Analysis } from '../../src-core/analysis';
// @ts-expect-error a plain script without types
import { findPython } from '../editor/chromium.mjs';
import { examples } from '../fuzz/inputs';

/** What `test/recompute/recompute.py` finds in a channel, from its YAML and Touchstone files alone. */
interface Recomputed {
  /** At 1/32, 2/32 … 32/32 of Nyquist. */
  readonly insertionLossDb: readonly number[];
  readonly mainCursorVolts: number;
  readonly cursors: readonly number[];
  readonly precursors: number;
  readonly ctleDcGainDb: number | null;
  readonly noiseVolts: number;
  readonly eyeHeightVolts: number;
}

const lanes = readdirSync('examples/lanes').filter((file) => file.endsWith('.channel.yaml'));
const pathOf = (lane: string) => `examples/lanes/${lane}`;

describe('every example, recomputed by other means in NumPy', () => {
  let recomputed: Record<string, Recomputed>;
  const analyses = new Map<string, Analysis>();

  beforeAll(async () => {
    const python = process.env.LANEWRIGHT_PYTHON ?? findPython();
    const json = execFileSync(python, ['test/recompute/recompute.py', ...lanes.map(pathOf)], {
      encoding: 'utf8',
      env: { ...process.env, PYTHONDONTWRITEBYTECODE: '1' },
      maxBuffer: 1 << 26,
    });
    recomputed = JSON.parse(json);
    const source = examples(process.cwd());
    for (const lane of lanes) {
      const inputs = await source.inputs(`lanes/${lane}`, source.textOf(`lanes/${lane}`));
      analyses.set(lane, analyse(inputs, undefined, { until: 'link' }));
    }
  }, 300_000);

  test.each(lanes)('%s: loss within 0.05 dB to Nyquist', (lane) => {
    const { cascade, networks } = analyses.get(lane)!;
    const s = cascade!.total.differential;
    const { insertionLossDb } = recomputed[pathOf(lane)];
    expect(insertionLossDb.length).toBe(32);
    insertionLossDb.forEach((wanted, step) => {
      const at = 8 * (((step + 1) * 2 ** networks!.grid.k) / 64) + 4;
      const loss = -20 * Math.log10(Math.hypot(s[at], s[at + 1]));
      expect(Math.abs(loss - wanted), `at ${step + 1}/32 of Nyquist`).toBeLessThan(0.05);
    });
  });

  test.each(lanes)('%s: cursors within 0.5 %% of the main one', (lane) => {
    const { cursors, precursors, mainCursorVolts, ctleDcGainDb = null } = analyses.get(lane)!.link!;
    const other = recomputed[pathOf(lane)];
    expect(other.ctleDcGainDb).toBe(ctleDcGainDb);
    const from = Math.max(-precursors, -other.precursors);
    const to = Math.min(cursors.length - precursors, other.cursors.length - other.precursors);
    expect(to - from).toBeGreaterThan(8);
    for (let m = from; m < to; m++) {
      const difference = cursors[m + precursors] - other.cursors[m + other.precursors];
      expect(Math.abs(difference), `cursor ${m}`).toBeLessThan(0.005 * mainCursorVolts);
    }
  });

  test.each(lanes)('%s: eye height within 2 %% of the main cursor', (lane) => {
    const { eyeHeightVolts, mainCursorVolts, noiseVolts } = analyses.get(lane)!.link!;
    const other = recomputed[pathOf(lane)];
    expect(Math.abs(noiseVolts / other.noiseVolts - 1)).toBeLessThan(1e-3);
    expect(eyeHeightVolts).toBeGreaterThan(0);
    expect(Math.abs(eyeHeightVolts - other.eyeHeightVolts)).toBeLessThan(0.02 * mainCursorVolts);
  });
});
