import type { Analysis } from '../analysis';
import { maskOf, networkWithin } from '../figures/insertion-loss-limit';
import { insertionLossAt } from '../figures/measures';
import type { Limit } from '../model/types';
import { show } from '../quantity/show';
import { frequencyEnd, lossAxis, namesOf, nyquistGuide, sampled } from './sampled';
import type { Mark, Plot, PlotLimit, Series } from './types';

/** More marks than this hide the curve; the deepest are kept. */
const mostMarks = 16;

/** Loss of the whole path and of each cut that a limit judges, with limits, masks and the elements behind the notches. */
export const insertionLossPlot: Plot = {
  name: 'insertion-loss',
  title: 'Insertion loss',
  describe(analysis) {
    const { model, networks, cascade } = analysis;
    if (!networks || !cascade) return undefined;
    const { nyquistFrequency } = model;
    const domain = [0, frequencyEnd(analysis)] as const;
    const whole = lossOf(analysis, undefined, 'Whole path');
    const cuts = cutsOf(analysis);
    const limits = limitsOf(analysis);
    const marks = resonanceMarks(analysis, domain[1]);
    const allDb = [...[whole, ...cuts].flatMap(({ y }) => Array.from(y)), ...limits.flatMap(({ y }) => Array.from(y))];
    const atNyquist = show.loss(insertionLossAt(cascade.total.differential, networks.grid, nyquistFrequency));
    return {
      name: this.name,
      title: this.title,
      x: { label: 'Frequency', unit: 'Hz', domain },
      y: lossAxis('Insertion loss', allDb),
      series: [whole, ...cuts],
      limits,
      guides: nyquistGuide(model),
      marks,
      summary: `${atNyquist} at Nyquist (${show.frequency(nyquistFrequency)}); ${resonancesInWords(marks, domain[1])}${namesOf(limits)}`,
    };
  },
};

function lossOf(analysis: Analysis, between: readonly [number, number] | undefined, name: string): Series {
  const { networks, cascade } = analysis;
  const { differential } = between ? cascade!.between(between[0], between[1]) : cascade!.total;
  const grid = networks!.grid;
  return {
    name,
    ...sampled(grid, frequencyEnd(analysis), (frequencyHz) => insertionLossAt(differential, grid, frequencyHz)),
  };
}

const isLossLimit = (limit: Analysis['model']['limits'][number]): limit is Limit<'insertion-loss'> =>
  limit.kind === 'insertion-loss';

/** Limits with `between` judge their own part of the path, so that part's curve is drawn too. */
function cutsOf(analysis: Analysis): Series[] {
  const { elements, limits } = analysis.model;
  const seen = new Set<string>();
  return limits.filter(isLossLimit).flatMap(({ between }) => {
    if (!between || seen.has(String(between)) || (between[0] === 0 && between[1] === elements.length - 1)) return [];
    seen.add(String(between));
    return [lossOf(analysis, between, `${elements[between[0]].name} to ${elements[between[1]].name}`)];
  });
}

function limitsOf(analysis: Analysis): PlotLimit[] {
  return analysis.model.limits.filter(isLossLimit).flatMap((limit) => {
    const mask = maskOf(limit, analysis.model.nyquistFrequency);
    if (mask.length === 0 || !networkWithin(limit, analysis)) return [];
    const met = analysis.limits.find(({ name }) => name === limit.name)?.met ?? true;
    return [
      {
        name: limit.name,
        x: mask.map(({ atHz }) => atHz),
        y: mask.map(({ lossDb }) => lossDb),
        met,
        forbidden: 'above' as const,
      },
    ];
  });
}

function resonanceMarks({ cascade }: Analysis, endHz: number): Mark[] {
  const shown = cascade!.resonances.filter(({ frequencyHz }) => frequencyHz <= endHz);
  const deepest = [...shown].sort((a, b) => b.depthDb - a.depthDb).slice(0, mostMarks);
  return shown
    .filter((resonance) => deepest.includes(resonance))
    .map(({ frequencyHz, lossDb, elements }) => ({
      x: frequencyHz,
      y: lossDb,
      label: `${elements.length > 0 ? elements.join(' or ') : 'resonance'} ${show.frequency(frequencyHz)}`,
      ...(elements.length > 0 && { element: elements[0] }),
    }));
}

function resonancesInWords(marks: readonly Mark[], endHz: number): string {
  if (marks.length === 0) return `no resonance up to ${show.frequency(endHz)}.`;
  return `${marks.length === 1 ? 'resonance' : 'resonances'}: ${marks.map(({ label }) => label).join(', ')}.`;
}
