import { networkAt } from '../cascade/network-at';
import type { Limit } from '../model/types';
import { show } from '../quantity/show';
import type { Computed } from './computed';
import { networkWithin, ROUNDING_DB } from './insertion-loss-limit';
import { type End, frequenciesBeyond, frequenciesWithin, returnLossAt, returnLossOf } from './measures';
import type { LimitOutcome } from './types';

/** Return loss in a band, looked at from the named end or from both: the point with the least. */
export function returnLossOutcome(limit: Limit<'return-loss'>, computed: Computed): LimitOutcome | undefined {
  const { networks } = computed;
  const { band, min, at } = limit.values;
  const s = networks && networkWithin(limit, computed);
  if (!s || !min) return undefined;
  const grid = networks.grid;
  // Without a band it is judged from the first point above 0 Hz, where nothing reflects, to Nyquist.
  const [fromHz, toHz] = band ? [band.fromHz, band.toHz] : [grid.stepHz, computed.model.nyquistFrequency];
  const beyond = frequenciesBeyond(grid, fromHz, toHz);
  const above = beyond.length > 0 ? networkAt(networks, beyond, limit.between).differential : undefined;
  let worst: { atHz: number; lossDb: number; end: End } | undefined;
  for (const end of at ? [at] : (['transmitter', 'receiver'] as const)) {
    const judge = (atHz: number, lossDb: number) => {
      if (!worst || lossDb < worst.lossDb) worst = { atHz, lossDb, end };
    };
    for (const atHz of frequenciesWithin(grid, fromHz, toHz)) judge(atHz, returnLossAt(s, grid, end, atHz));
    if (above) for (let i = 0; i < beyond.length; i++) judge(beyond[i], returnLossOf(above, end, i));
  }
  if (!worst) return undefined;
  const { atHz, lossDb, end } = worst;
  const figure = (name: string, title: string, value: number, note?: string) =>
    ({ name, title, value, unit: 'dB', text: show.returnLoss(value), worse: 'lower', ...(note && { note }) }) as const;
  const where = `at ${show.frequency(atHz)}, seen from the ${end}`;
  return {
    name: limit.name,
    kind: limit.kind,
    met: lossDb >= min.value - ROUNDING_DB,
    limit: figure('limit', 'Least return loss', min.value),
    actual: figure('return-loss', 'Return loss', lossDb, where),
    marginShare: min.value > 0 ? (lossDb - min.value) / min.value : 0,
    text: `return loss ${show.returnLoss(lossDb)}, at least ${show.returnLoss(min.value)}, ${where}`,
    atHz,
    end,
  };
}
