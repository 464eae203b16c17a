import { show } from '../../../src-core/quantity/show';
import type { ChannelReview, FigureChange, Review } from '../../../src-core/review/index';

/** A figure on one side; where both read alike it is its note that differs, such as how deep a notch is. */
export const sideText = ({ from, to }: FigureChange, side: 'from' | 'to') => {
  const figure = side === 'from' ? from : to;
  if (!figure) return 'unknown';
  return from?.text === to?.text && figure.note ? `${figure.text}, ${figure.note}` : figure.text;
};

/** What every form of a review says in the same words. */
export const figureText = (change: FigureChange) => {
  const { from, to, deltaText, better } = change;
  const way = better === undefined ? '' : better ? ', better' : ', worse';
  if (!from && !to) return `${deltaText}${way}`;
  return `${sideText(change, 'from')} → ${sideText(change, 'to')} (${deltaText}${way})`;
};

export const stateText = ({ state, why, verdict }: ChannelReview): string => {
  const through = why === 'itself' ? '' : ` through ${why.join(', ')}`;
  switch (state) {
    case 'added':
      return `added: ${verdict.to?.text ?? ''}`;
    case 'removed':
      return `removed: ${verdict.from?.text ?? ''}`;
    case 'no-effect':
      return `no electrical effect${through}`;
    case 'broken':
      return `cannot be computed${through}`;
    default:
      return `changed${through}`;
  }
};

export const marginText = ({ smallestMarginFall: fall }: ChannelReview) =>
  fall === undefined || fall === 0
    ? ''
    : `smallest margin ${fall > 0 ? 'down' : 'up'} by ${show.percent(Math.abs(fall))} of its limit`;

export const summaryText = ({ channels, unchanged }: Review) => {
  const touched = channels.filter(({ state }) => state !== 'no-effect').length;
  const idle = channels.length - touched;
  return [
    `${show.count(touched, 'channel')} changed`,
    ...(idle > 0 ? [`${idle} without electrical effect`] : []),
    `${unchanged} untouched`,
  ].join(', ');
};

export const resultText = ({ failed: { reasons } }: Review) =>
  reasons.length > 0 ? `Fails: ${show.count(reasons, 'reason')}.` : 'Passes.';

/** The figures that most ask about, for the causes: all of them would be a page for each group. */
const CHIEF = ['insertion-loss-at-nyquist', 'worst-return-loss', 'lowest-resonance', 'eye-height', 'eye-width'];
export const chief = (figures: readonly FigureChange[]) => figures.filter(({ name }) => CHIEF.includes(name));
