import { describe, expect, test } from 'vitest';
import { exampleData } from '../../src-core/plots/testing';
import { pageHtml } from './html';
import { readFromPage, readToPage } from './messages';
import { readState } from './state';
import { between, fitted, panned, zoomed } from './zoom';

describe('zoom', () => {
  const whole = [0, 100] as const;

  test('keeps what is under the pointer where it is', () => {
    const [from, to] = zoomed(whole, undefined, 0.5, 20)!;
    expect([from, to]).toEqual([10, 60]);
    expect((20 - from) / (to - from)).toBeCloseTo(0.2);
  });

  test('never leaves the whole, and ends as the whole', () => {
    expect(zoomed(whole, [90, 100], 2, 100)).toEqual([80, 100]);
    expect(zoomed(whole, [10, 60], 4, 20)).toBeUndefined();
    const [from, to] = zoomed(whole, [50, 50.001], 0.5, 50)!;
    expect(to - from).toBeCloseTo(0.01);
  });

  test('moves by shares of its width, up to the ends', () => {
    expect(panned(whole, [20, 40], 0.5)).toEqual([30, 50]);
    expect(panned(whole, [70, 90], 5)).toEqual([80, 100]);
    expect(panned(whole, undefined, 1)).toBeUndefined();
  });

  test('a drag in either direction gives the part, a slip of the hand none', () => {
    expect(between(whole, 60, 20)).toEqual([20, 60]);
    expect(between(whole, -5, 120)).toEqual([0, 100]);
    expect(between(whole, 20, 20.0001)).toBeUndefined();
  });

  test('a kept zoom is cut to a domain that changed, or dropped', () => {
    expect(fitted(whole, [50, 150])).toEqual([50, 100]);
    expect(fitted(whole, [150, 250])).toBeUndefined();
    expect(fitted(whole, [-10, 110])).toBeUndefined();
    expect(fitted(whole, [Number.NaN, 3])).toBeUndefined();
  });
});

describe('messages', () => {
  const at = { file: 'a.channel.yaml', path: ['path', 1] };

  test('of the page are taken apart, and nothing else is passed on', () => {
    expect(readFromPage({ type: 'select', at, element: 'dive', command: 'x' })).toEqual({
      type: 'select',
      at,
      element: 'dive',
    });
    expect(readFromPage({ type: 'save', format: 'csv', name: 'eye', content: 'a' })).toEqual({
      type: 'save',
      format: 'csv',
      name: 'eye',
      content: 'a',
    });
    expect(readFromPage({ type: 'ready', more: 1 })).toEqual({ type: 'ready' });
  });

  test.each([
    null,
    'ready',
    { type: 'select' },
    { type: 'select', at: { file: 1, path: [] } },
    { type: 'select', at: { file: 'a', path: [{}] } },
    { type: 'select', at, element: 3 },
    { type: 'save', format: 'exe', name: 'eye', content: '' },
    { type: 'save', format: 'svg', name: '../eye', content: '' },
    { type: 'save', format: 'svg', name: 'eye', content: 5 },
    { type: 'open', uri: 'file:///etc' },
  ])('of another shape are refused: %j', (message) => {
    expect(readFromPage(message)).toBeUndefined();
  });

  test('of the host are checked too', () => {
    expect(readToPage({ type: 'data', uri: 'file:///a', version: 1, data: exampleData() })).toBeDefined();
    expect(readToPage({ type: 'cursorElement', element: null })).toBeDefined();
    for (const wrong of [
      { type: 'data', uri: 'file:///a', data: {} },
      { type: 'theme', kind: 'pink' },
      { type: 'stale' },
      [],
    ]) {
      expect(readToPage(wrong)).toBeUndefined();
    }
  });
});

test('a kept state is read as far as it makes sense', () => {
  expect(
    readState({
      uri: 'file:///a',
      zooms: { eye: { x: [0, 1], y: 'no' }, bad: 3 },
      tables: ['eye', 4],
      scrollTop: 'far',
    }),
  ).toEqual({
    uri: 'file:///a',
    zooms: { eye: { x: [0, 1] } },
    tables: ['eye'],
  });
  expect(readState(undefined)).toEqual({});
});

describe('the page', () => {
  const parts = {
    nonce: 'abc123',
    cspSource: 'https://x.test',
    scriptUri: 'https://x.test/preview.js',
    styleUri: 'https://x.test/preview.css',
  };

  test('allows its one script and its style sheet, nothing else', () => {
    const html = pageHtml(parts).replace(/&#39;/g, "'");
    expect(html).toContain(
      "default-src 'none'; script-src 'nonce-abc123'; style-src https://x.test; img-src https://x.test data:",
    );
    expect(html).not.toMatch(/unsafe|<style|style=/);
    expect(html.match(/<script/g)).toHaveLength(1);
  });

  test('takes no nonce that could end the policy', () => {
    expect(() => pageHtml({ ...parts, nonce: `x'; script-src *` })).toThrow(RangeError);
    expect(pageHtml({ ...parts, scriptUri: '"><script>' })).not.toContain('"><script>');
  });
});
