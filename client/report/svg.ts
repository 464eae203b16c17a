import type { Analysis } from '../../src-core/analysis';
import { plots, previewData, renderSvg } from '../../src-core/plots';
import { escapeMarkup, px, shortened, tag } from '../../src-core/plots/kit/svg';

const width = 960;
const height = 480;
const headHeight = 62;

const names = () => plots.map(({ name }) => name);

/**
 * One plot as a file of its own, or all of them below each other under title and verdict.
 * @throws RangeError if there is no plot of that name
 */
export function reportSvg(analysis: Analysis, plotName?: string): string {
  if (plotName !== undefined && !names().includes(plotName)) {
    throw new RangeError(`There is no plot \`${plotName}\`; there are ${names().join(', ')}.`);
  }
  const wanted = plots.filter(({ name }) => plotName === undefined || name === plotName);
  const data = previewData(analysis);
  const drawn = wanted.map((plot) => {
    const description = plot.describe(analysis);
    if (!description)
      return words(`${plot.title}: ${data.plots.find(({ name }) => name === plot.name)?.missing ?? ''}`);
    return renderSvg(description, { width, height, theme: 'print', idPrefix: plot.name });
  });
  const declaration = '<?xml version="1.0" encoding="UTF-8"?>\n';
  if (plotName !== undefined) return `${declaration}${drawn[0]}\n`;
  const total = headHeight + drawn.length * (height + 30);
  const text = (y: number, size: number, content: string) =>
    tag('text', { x: 12, y, 'font-size': size, fill: '#24292f' }, escapeMarkup(shortened(content, 130)));
  const content = [
    tag('title', {}, escapeMarkup(data.title)),
    tag('desc', {}, escapeMarkup(data.verdict.text)),
    tag('rect', { x: 0, y: 0, width, height: total, fill: '#ffffff' }),
    text(26, 18, data.title),
    text(48, 13, data.verdict.text),
    ...drawn.map((svg, i) => {
      const top = headHeight + i * (height + 30);
      return text(top + 18, 14, wanted[i].title) + tag('g', { transform: `translate(0,${px(top + 26)})` }, svg);
    }),
  ];
  return `${declaration}${tag('svg', { xmlns: 'http://www.w3.org/2000/svg', width, height: total, viewBox: `0 0 ${px(width)} ${px(total)}`, 'font-family': 'system-ui, sans-serif' }, content.join(''))}\n`;
}

/** In place of a plot: why there is none. */
function words(text: string): string {
  const inside =
    tag('rect', { x: 0, y: 0, width, height: 60, fill: '#ffffff' }) +
    tag('text', { x: 12, y: 34, 'font-size': 13, fill: '#24292f' }, escapeMarkup(shortened(text, 140)));
  return tag(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      width,
      height: 60,
      viewBox: `0 0 ${px(width)} 60`,
      role: 'img',
      'font-family': 'system-ui, sans-serif',
    },
    inside,
  );
}
