import type { Analysis } from '../analysis';
import { networkWithin } from '../figures/insertion-loss-limit';
import { type End, returnLossAt, worstReturnLoss } from '../figures/measures';
import type { Limit } from '../model/types';
import { show } from '../quantity/show';
import { frequencyEnd, lossAxis, namesOf, nyquistGuide, sampled } from './sampled';
import type { Plot, PlotLimit, Series } from './types';

/** Nothing of interest lies deeper; the first points come near infinity. */
const deepestDb = 50;

/** Return loss seen from both ends of the path, and of each cut that a limit judges, with the limits' bands. */
export const returnLossPlot: Plot = {
  name: 'return-loss',
  title: 'Return loss',
  describe(analysis) {
    const { model, networks, cascade } = analysis;
    if (!networks || !cascade) return undefined;
    const limits = limitsOf(analysis);
    const series = [...endsOf(analysis, cascade.total.differential, ''), ...cutsOf(analysis)];
    const worst = worstReturnLoss(cascade.total.differential, networks.grid, model.nyquistFrequency);
    return {
      name: this.name,
      title: this.title,
      x: { label: 'Frequency', unit: 'Hz', domain: [0, frequencyEnd(analysis)] },
      y: lossAxis(
        'Return loss',
        [...series.flatMap(({ y }) => Array.from(y)), ...limits.flatMap(({ y }) => Array.from(y))],
        deepestDb,
      ),
      series,
      limits,
      guides: nyquistGuide(model),
      marks: [],
      summary:
        (worst.lossDb > 60
          ? `Hardly anything comes back: ${show.returnLoss(worst.lossDb)} up to Nyquist.`
          : `Least ${show.returnLoss(worst.lossDb)} up to Nyquist, at ${show.frequency(worst.frequencyHz)}, seen from the ${worst.end}.`) +
        namesOf(limits),
    };
  },
};

const ends: readonly End[] = ['transmitter', 'receiver'];

function endsOf(analysis: Analysis, s: Float64Array, suffix: string, which: readonly End[] = ends): Series[] {
  const grid = analysis.networks!.grid;
  return which.map((end) => ({
    name: `From the ${end}${suffix}`,
    ...sampled(grid, frequencyEnd(analysis), (frequencyHz) => returnLossAt(s, grid, end, frequencyHz)),
  }));
}

const isReturnLimit = (limit: Analysis['model']['limits'][number]): limit is Limit<'return-loss'> =>
  limit.kind === 'return-loss';

function cutsOf(analysis: Analysis): Series[] {
  const { elements, limits } = analysis.model;
  const seen = new Set<string>();
  return limits.filter(isReturnLimit).flatMap(({ between, values }) => {
    if (!between || (between[0] === 0 && between[1] === elements.length - 1)) return [];
    const key = `${between} ${values.at ?? ''}`;
    if (seen.has(key)) return [];
    seen.add(key);
    const suffix = `, ${elements[between[0]].name} to ${elements[between[1]].name}`;
    return endsOf(
      analysis,
      analysis.cascade!.between(between[0], between[1]).differential,
      suffix,
      values.at ? [values.at] : ends,
    );
  });
}

function limitsOf(analysis: Analysis): PlotLimit[] {
  const { model, networks } = analysis;
  return model.limits.filter(isReturnLimit).flatMap((limit) => {
    const { band, min } = limit.values;
    if (!min || !networkWithin(limit, analysis)) return [];
    const [from, to] = band ? [band.fromHz, band.toHz] : [networks!.grid.stepHz, model.nyquistFrequency];
    const met = analysis.limits.find(({ name }) => name === limit.name)?.met ?? true;
    return [{ name: limit.name, x: [from, to], y: [min.value, min.value], met, forbidden: 'below' as const }];
  });
}
