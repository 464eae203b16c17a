import { describe, expect, test } from 'vitest';
import { renderSvg } from '../../src-core/plots';
import { exampleData } from '../../src-core/plots/testing';
import { analyseExample } from '../../src-core/rules/testing';
import { caution } from './cautions';
import { htmlOfData } from './html';
import { reportHtml, reportMarkdown, reportSvg } from './index';
import { markdownOfData } from './markdown';
import { escapeMarkdown, markdownOf, markdownTable } from './markdown-text';

const analysis = analyseExample('title: Nothing changed');
const hostile = `</title><img src=x onerror=alert(1)>\`|*_[x](javascript:alert(1)) @someone #12 <!-- https://evil.test \u202e\u0007 "'`;

describe('the page', () => {
  const html = reportHtml(analysis, { version: '1.2.3' });

  test('has job, verdict, limits, figures, findings, ledger, plots and cautions', () => {
    expect(html).toContain(`<h1>Nothing changed</h1>`);
    expect(html).toContain(analysis.verdict.text);
    for (const { text } of [...analysis.figures, ...analysis.limits]) expect(html).toContain(text);
    for (const heading of [
      'Limits',
      'Figures',
      'Findings',
      'What each element spends',
      'Statistical eye',
      'How far to trust this',
    ])
      expect(html).toContain(`<h2>${heading}</h2>`);
    expect(html.match(/<svg /g)).toHaveLength(5);
    expect(html).toContain('computed by lanewright 1.2.3');
  });

  test('stands alone: no script, nothing fetched', () => {
    expect(html).not.toMatch(/<script|<link|<img|url\(http|src=/);
    expect(html.replace(/http:\/\/www\.w3\.org\/2000\/svg/g, '')).not.toMatch(/https?:\/\//);
  });

  test('has each id once', () => {
    const ids = [...html.matchAll(/ id="([^"]+)"/g)].map(([, id]) => id);
    expect(new Set(ids).size).toBe(ids.length);
  });

  test('is the same for the same analysis', () => {
    expect(reportHtml(analysis, { version: '1.2.3' })).toBe(html);
  });
});

describe('text of a file', () => {
  const data = exampleData({ title: hostile, element: hostile, message: hostile });

  test('stays text in HTML', () => {
    const pictures = new Map(
      data.plots.flatMap(({ name, description }) =>
        description
          ? [[name, renderSvg(description, { width: 600, height: 300, theme: 'vars', idPrefix: name })] as const]
          : [],
      ),
    );
    const html = htmlOfData(data, pictures);
    for (const unwanted of ['<img', '</title><img', '\u202e', '\u0007']) expect(html).not.toContain(unwanted);
    expect(html.match(/<\/title>/g)).toHaveLength(
      1 + pictures.size + data.plots.reduce((sum, { description }) => sum + (description?.marks.length ?? 0), 0),
    );
  });

  test('stays text in Markdown: no HTML, no link, no mention, no broken table', () => {
    const md = markdownOfData(data);
    expect(md).not.toMatch(/(^|[^\\])[<[]/);
    for (const unwanted of ['@someone', 'https://evil', '\u202e', '\u0007']) expect(md).not.toContain(unwanted);
    const rows = md.split('\n').filter((line) => line.startsWith('|'));
    for (const row of rows) expect(row).toMatch(/ \|$/);
    const ledger = rows.filter((row) => /^\| (element|Element|breakout|main-run|rise|reflections)/.test(row));
    const bars = (row: string) => row.replace(/\\\|/g, '').split('|').length;
    expect(new Set(ledger.map(bars)).size).toBe(1);
  });

  test('without a title stays a page', () => {
    expect(htmlOfData(exampleData({ title: '' }), new Map())).toContain('<h1></h1>');
  });
});

describe('Markdown', () => {
  const md = reportMarkdown(analysis);

  test('has the same figures, and a sentence in place of each picture', () => {
    for (const { text } of analysis.figures) expect(md).toContain(escapeMarkdown(text));
    expect(md).toContain('- **Insertion loss**: ');
    expect(md).toContain(caution);
    expect(md).not.toContain('<svg');
  });

  test.each([
    ['1. not a list', '1\\. not a list'],
    ['- not a list', '\\- not a list'],
    ['# no heading', '\\# no heading'],
    ['a|b', 'a\\|b'],
    ['two\nlines', 'two lines'],
    ['50 ohm ± 8%', '50 ohm ± 8%'],
    ['0.8 dB at 12.9 GHz', '0.8 dB at 12.9 GHz'],
  ])('%j is written %j', (text, written) => {
    expect(escapeMarkdown(text)).toBe(written);
  });

  test('code between backticks stays code, unless it could break out', () => {
    expect(markdownOf('The stub of `dive` is long.')).toBe('The stub of `dive` is long.');
    expect(markdownOf('The stub of `a|b` is long.')).toBe('The stub of a\\|b is long.');
    expect(markdownOf('An odd ` tick')).toBe('An odd \\` tick');
  });

  test('an empty table is nothing', () => {
    expect(markdownTable(['a'], [])).toBe('');
  });
});

describe('pictures', () => {
  test('one plot is a file of its own', () => {
    const svg = reportSvg(analysis, 'eye');
    expect(svg).toMatch(/^<\?xml version="1\.0" encoding="UTF-8"\?>\n<svg xmlns/);
    expect(svg.match(/<svg /g)).toHaveLength(1);
    expect(svg).not.toContain('var(');
  });

  test('all plots stand below each other under title and verdict', () => {
    const svg = reportSvg(analysis);
    expect(svg.match(/<svg /g)).toHaveLength(6);
    expect(svg).toContain('>Nothing changed</text>');
  });

  test('a plot of another name is refused, with the names there are', () => {
    expect(() => reportSvg(analysis, 'smith')).toThrow(/insertion-loss, return-loss, impedance, single-bit, eye/);
  });

  test('where there is nothing to draw the picture says why', () => {
    expect(reportSvg(analyseExample('line-rate: fast'), 'eye')).toContain('Nothing can be computed before');
  });
});
