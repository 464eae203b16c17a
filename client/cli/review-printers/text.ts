import { styleText } from 'node:util';
import type { ChannelReview, FigureChange } from '../../../src-core/review/index';
import { plain } from '../printers/plain';
import type { ReviewPrinter } from './types';
import { chief, figureText, marginText, resultText, stateText, summaryText } from './words';

type Style = Parameters<typeof styleText>[0];
type Paint = (style: Style, words: string) => string;

/** For people at a terminal: what was loosened first, then what changed, what that did, and what did it. */
export const reviewText: ReviewPrinter = (review, { colour }) => {
  const paint: Paint = (style, words) => (colour ? styleText(style, words, { validateStream: false }) : words);
  const { failed, notes } = review;
  const lines = [
    `${plain(review.head)} against ${plain(review.base)}`,
    ...review.channels.flatMap((channel) => ['', ...linesOf(channel, paint)]),
    '',
    ...notes.map(plain),
    ...failed.reasons.map((reason) => `${paint('red', 'fails')}  ${plain(reason)}`),
    `${summaryText(review)}. ${resultText(review)}`,
  ];
  return `${lines.join('\n')}\n`;
};

function linesOf(channel: ChannelReview, paint: Paint): string[] {
  const { verdict, changes, loosened, waivers, figures, appeared, gone, causes, together, notes } = channel;
  const row = (what: string, words: string, style?: Style) => {
    const label = what.padEnd(12);
    return `  ${style ? paint(style, label) : label}${plain(words)}`;
  };
  const margin = marginText(channel);
  const told = new Set([...loosened, ...waivers].map(({ words }) => words));
  return [
    `${paint('bold', plain(channel.file))}  ${plain(stateText(channel))}${margin ? `; ${margin}` : ''}`,
    ...notes.map((note) => row('', note)),
    ...loosened.map(({ words }) => row('loosened', words, 'yellow')),
    ...waivers.map(({ words }) => row('waiver', words, 'yellow')),
    ...changes
      .filter(({ words }) => !told.has(words))
      .map(({ derived, words }) => row(derived ? 'follows' : 'change', words)),
    ...(verdict.from && verdict.to ? [row('before', verdict.from.text), row('after', verdict.to.text)] : []),
    ...figures.map((figure) => row('figure', `${figure.title}: ${figureText(figure)}`, styleOf(figure))),
    ...appeared.map(({ severity, rule, message }) => row('appeared', `${severity} ${rule}: ${message}`, 'red')),
    ...gone.map(({ severity, rule, message }) => row('gone', `${severity} ${rule}: ${message}`, 'green')),
    ...causes.flatMap(({ words, alone, without }) => [
      row('cause', words),
      row('  alone', brief(alone)),
      row('  without', brief(without)),
    ]),
    ...(together ? [row('together', brief(together))] : []),
  ];
}

const styleOf = ({ better }: FigureChange): Style | undefined =>
  better === undefined ? undefined : better ? 'green' : 'red';

const brief = (figures: readonly FigureChange[]) =>
  chief(figures)
    .map((figure) => `${figure.title}: ${figureText(figure)}`)
    .join('; ') || 'nothing that one sees';
