import { readdirSync } from 'node:fs';
import { beforeAll, describe, expect, test } from 'vitest';
import { checkedFile } from '../../client/cli/printers/checked-file';
import { reportHtml, reportMarkdown } from '../../client/report/index';
import { analyse } from '../../src-core/analyse';
import type { Analysis } from '../../src-core/analysis';
import { describeAt } from '../../src-core/assist/describe';
import { hintsOf } from '../../src-core/assist/hints';
import { curvesOf } from '../../src-core/cascade/curves';
import { previewData } from '../../src-core/plots/index';
import { show } from '../../src-core/quantity/show';
import { rangeOf } from '../../src-core/text/range';
import { examples } from '../fuzz/inputs';

/** Text as a reader sees it: markup gone, entities read. */
const words = (markup: string) =>
  markup
    .replace(/<[^>]*>/g, ' ')
    .replace(/&#(\d+);/g, (_all, code) => String.fromCharCode(Number(code)))
    .replace(/&amp;/g, '&')
    .replace(/&lt;/g, '<')
    .replace(/&gt;/g, '>')
    .replace(/\\(.)/g, '$1')
    .replace(/[*`|]/g, ' ')
    .replace(/\s+/g, ' ');

const channels = readdirSync('examples/lanes')
  .filter((file) => file.endsWith('.channel.yaml'))
  .map((file) => `lanes/${file}`);

describe.each(channels)('%s: the same string for each figure on every surface', (file) => {
  let analysis: Analysis;
  beforeAll(async () => {
    const source = examples(process.cwd());
    analysis = analyse(await source.inputs(file, source.textOf(file)), undefined, { until: 'link' });
  });

  test('figures of the whole: JSON, preview, HTML, Markdown', () => {
    const surfaces = {
      json: JSON.stringify(checkedFile(analysis).figures.map(({ text }) => text)),
      preview: JSON.stringify(previewData(analysis)),
      html: words(reportHtml(analysis)),
      markdown: words(reportMarkdown(analysis)),
    };
    expect(analysis.figures.length).toBeGreaterThan(5);
    for (const figure of analysis.figures) {
      for (const [surface, text] of Object.entries(surfaces))
        expect(text, `${figure.name} in ${surface}`).toContain(figure.text);
    }
  });

  test('each element’s own loss: JSON, hover, hint, preview, reports', () => {
    const parsed = analysis.parsed.get(file);
    const hints = hintsOf(analysis, file).map(({ label }) => label);
    const json = checkedFile(analysis);
    const preview = JSON.stringify(previewData(analysis));
    const html = words(reportHtml(analysis));
    const markdown = words(reportMarkdown(analysis));
    for (const row of analysis.ledger?.rows ?? []) {
      const loss = row.figures.find(
        ({ name }) => name === 'own-loss-at-nyquist' || name === 'insertion-loss-at-nyquist',
      );
      expect(loss, row.element).toBeDefined();
      if (!loss || !parsed) continue;
      const element = analysis.model.elements[row.index];
      const hover = describeAt(
        analysis,
        file,
        rangeOf(parsed, { ...element.place, path: [...element.place.path, element.kind], on: 'value' }).start,
      );
      expect(words(hover?.markdown ?? ''), `${row.element} in hover`).toContain(loss.text);
      expect(JSON.stringify(json.ledger[row.index]), `${row.element} in JSON`).toContain(JSON.stringify(loss.text));
      for (const [surface, text] of Object.entries({ preview, html, markdown }))
        expect(text, `${row.element} in ${surface}`).toContain(loss.text);
      const ownHint = hints.find((label) => label.includes('dB') && label.includes(loss.text));
      if (loss.value > 0.05 && element.kind !== 'via' && element.kind !== 'capacitor')
        expect(ownHint, `${row.element}: a hint of ${loss.text}, got ${hints}`).toBeDefined();
    }
  });

  test('curves hold the numbers that the figures were read from', () => {
    const nyquist = analysis.model.nyquistFrequency;
    const { parts } = curvesOf(analysis, { frequencies: Float64Array.of(nyquist) });
    const column = parts[0].columns.find(({ name }) => /^S(DD)?21_dB$/.test(name));
    const figure = analysis.figures.find(({ name }) => name === 'insertion-loss-at-nyquist');
    expect(figure?.text).toContain(show.loss(-(column?.values[0] ?? Number.NaN)));
  });
});
