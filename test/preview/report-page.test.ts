import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, expect, test, vi } from 'vitest';
import { reportHtml } from '../../client/report';
import { analyseExample } from '../../src-core/rules/testing';
import { launch } from './harness';

const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
let browser: Browser;
// A browser on a busy machine is slow; nothing here is timed.
vi.setConfig({ testTimeout: 60_000 });
beforeAll(async () => {
  browser = await launch();
}, 60_000);
afterAll(() => browser?.close());

test.each(['light', 'dark'] as const)(
  'the report has no violation in %s colours, fetches nothing, and its plots are drawn',
  async (colorScheme) => {
    const context = await browser.newContext({ colorScheme });
    const page = await context.newPage();
    const requests: string[] = [];
    page.on('request', (request) => requests.push(request.url()));
    await page.setContent(
      reportHtml(
        analyseExample(
          'limits: [{ insertion-loss: whole, max: 0.5 dB @ nyquist }, { eye: main, height: 40 mV, width: 0.3 UI }]',
        ),
      ),
    );
    expect(await page.locator('figure svg').count()).toBe(5);
    await page.evaluate(axeSource);
    const violations = await page.evaluate(async () => {
      const { axe } = window as unknown as {
        axe: { run(): Promise<{ violations: { id: string; nodes: { html: string }[] }[] }> };
      };
      return (await axe.run()).violations.map(({ id, nodes }) => `${id}: ${nodes[0].html.slice(0, 200)}`);
    });
    expect(violations).toEqual([]);
    expect(requests).toEqual([]);
    await context.close();
  },
);
