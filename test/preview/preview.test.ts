import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { Browser, BrowserContext } from 'playwright-core';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, test, vi } from 'vitest';
import type { ToPage } from '../../client/preview/messages';
import type { PreviewData } from '../../src-core/plots/preview-data';
import { exampleData } from '../../src-core/plots/testing';
import { bundle, dress, launch, type Opened, openPage } from './harness';
import { themes } from './themes';

const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
const [light] = themes;
const dataMessage = (data: PreviewData = exampleData()): ToPage => ({
  type: 'data',
  uri: 'file:///lanes/rx0.channel.yaml',
  version: 1,
  data,
});

// A browser on a busy machine is slow; nothing here is timed.
vi.setConfig({ testTimeout: 60_000 });

let browser: Browser;
let script: string;
let context: BrowserContext;
let opened: Opened;

beforeAll(async () => {
  [browser, script] = await Promise.all([launch(), bundle()]);
}, 60_000);
afterAll(() => browser?.close());
beforeEach(async () => {
  context = await browser.newContext({ viewport: { width: 1100, height: 900 } });
  opened = await openPage(context, script, light);
}, 30_000);
afterEach(() => context.close());

async function axeViolations(): Promise<string[]> {
  await opened.page.evaluate(axeSource);
  return opened.page.evaluate(async () => {
    const { axe } = window as unknown as {
      axe: { run(): Promise<{ violations: { id: string; nodes: { html: string; failureSummary?: string }[] }[] }> };
    };
    const { violations } = await axe.run();
    return violations.flatMap(({ id, nodes }) =>
      nodes.map(({ html, failureSummary }) => `${id}: ${html.slice(0, 160)} ${failureSummary ?? ''}`),
    );
  });
}

const zoomOf = async (plot: string) =>
  ((await opened.state()).zooms as Record<string, { x?: [number, number] }> | undefined)?.[plot]?.x;

describe('the page under its policy', () => {
  test('says that it is ready and draws every plot without one violation', async () => {
    expect(await opened.sent()).toEqual([{ type: 'ready' }]);
    await opened.send(dataMessage());
    await opened.page.locator('.plot-card svg.plot').nth(2).waitFor();
    expect(await opened.page.locator('svg.plot').count()).toBe(3);
    expect(await opened.page.locator('.plot-card .nothing:visible').textContent()).toBe('This is not computed yet.');
    expect(await opened.violations()).toEqual([]);
  });

  test('the policy is real: a style that a script writes as markup is refused', async () => {
    await opened.page.evaluate(() => {
      const holder = document.body.appendChild(document.createElement('div'));
      holder.innerHTML = '<p style="color: red">x</p>';
    });
    await expect.poll(async () => (await opened.violations()).join()).toContain('style-src');
  });

  test('hostile text stays text, everywhere', async () => {
    const hostile = `<img src=x onerror="window.hacked=1"></script><script>window.hacked=1</script>\u202e\${x}'"&`;
    await opened.send(dataMessage(exampleData({ title: hostile, element: hostile, message: hostile })));
    await opened.page.locator('svg.plot').first().waitFor();
    await opened.page.locator('.tools button', { hasText: 'Table' }).first().click();
    expect(await opened.page.evaluate(() => (window as unknown as { hacked?: number }).hacked)).toBeUndefined();
    expect(await opened.page.locator('main img, main script').count()).toBe(0);
    expect(await opened.page.locator('.overview h1').textContent()).toBe(hostile);
    expect(await opened.violations()).toEqual([]);
  });

  test('messages of another shape are ignored', async () => {
    for (const message of [
      null,
      'data',
      { type: 'data' },
      { type: 'data', uri: 1, data: {} },
      { type: 'theme', kind: 'pink' },
    ]) {
      await opened.send(message as never);
    }
    expect(await opened.page.locator('svg.plot').count()).toBe(0);
  });
});

describe('accessibility', () => {
  test.each(themes)('no violation in the theme $name', async (theme) => {
    await dress(opened.page, theme);
    await opened.send(dataMessage());
    await opened.page.locator('.tools button', { hasText: 'Table' }).first().click();
    expect(await axeViolations()).toEqual([]);
  });

  test('no violation while the figures belong to an older text, or before there are any', async () => {
    expect(await axeViolations()).toEqual([]);
    await opened.send(dataMessage());
    await opened.send({ type: 'stale', what: 'all' });
    expect(await axeViolations()).toEqual([]);
  });

  test('forced colours draw contours in place of the colour map', async () => {
    await opened.page.emulateMedia({ forcedColors: 'active' });
    await opened.send(dataMessage());
    await opened.page.locator('.plot-contours').waitFor();
    expect(await opened.page.locator('.plot-heat').count()).toBe(0);
  });

  test('high contrast draws contours, and the colour map returns with an ordinary theme', async () => {
    await dress(opened.page, themes[2]);
    await opened.send(dataMessage());
    await opened.page.locator('.plot-contours path').first().waitFor();
    await dress(opened.page, themes[1]);
    await opened.page.locator('.plot-heat path').first().waitFor();
    expect(await opened.page.locator('.plot-contours').count()).toBe(0);
  });

  test('a narrow page needs no sideways scrolling', async () => {
    await opened.page.setViewportSize({ width: 320, height: 700 });
    await opened.send(dataMessage());
    await opened.page.locator('svg.plot').first().waitFor();
    expect(await opened.page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(320);
  });
});

describe('keyboard and pointer', () => {
  beforeEach(() => opened.send(dataMessage()));

  test('Tab reaches buttons, plot, marks and the ledger, in this order', async () => {
    const reached: string[] = [];
    while (reached.length < 60 && reached.at(-1) !== 'ledger row') {
      await opened.page.keyboard.press('Tab');
      reached.push(
        await opened.page.evaluate(() => {
          const { activeElement: active } = document;
          if (active?.closest('[data-mark]')) return `mark ${active.getAttribute('aria-label')}`;
          if (active?.matches('.surface')) return 'surface';
          return active?.matches('.ledger tr') ? 'ledger row' : (active?.tagName ?? '');
        }),
      );
    }
    const first = reached.indexOf('surface');
    expect(reached.slice(first, first + 3)).toEqual(['surface', 'mark dive 19.4 GHz', 'mark rise 19.9 GHz']);
    expect(reached.filter((name) => name === 'ledger row')).toHaveLength(1);
    expect(reached.indexOf('ledger row')).toBeGreaterThan(reached.lastIndexOf('surface'));
  });

  test('Enter on a mark selects its element, which the ledger then shows', async () => {
    await opened.page.locator('[data-element="dive"]').focus();
    await opened.page.keyboard.press('Enter');
    expect((await opened.sent()).at(-1)).toEqual({
      type: 'select',
      element: 'dive',
      at: { file: 'lanes/rx0.channel.yaml', path: ['path', 1] },
    });
    expect(await opened.page.locator('tr[aria-selected="true"] td').first().textContent()).toBe('dive');
  });

  test('a click on a mark selects too', async () => {
    await opened.page.locator('[data-element="rise"]').click({ position: { x: 12, y: 12 }, force: true });
    expect((await opened.sent()).at(-1)).toMatchObject({ type: 'select', element: 'rise' });
  });

  test('arrows move through the ledger, Enter selects lines', async () => {
    await opened.page.locator('.ledger tbody tr').first().focus();
    await opened.page.keyboard.press('ArrowDown');
    await opened.page.keyboard.press('ArrowDown');
    await opened.page.keyboard.press('Enter');
    expect((await opened.sent()).at(-1)).toMatchObject({ type: 'select', element: 'main-run' });
  });

  test('a finding selects its place', async () => {
    await opened.page.locator('section[aria-labelledby="findings-heading"] button').first().click();
    expect((await opened.sent()).at(-1)).toEqual({
      type: 'select',
      at: { file: 'lanes/rx0.channel.yaml', path: ['limits', 1] },
    });
  });

  test('the cursor of the text shows its element in ledger and plot', async () => {
    await opened.send({ type: 'cursorElement', element: 'rise' });
    expect(await opened.page.locator('.plot-mark.is-current').getAttribute('data-element')).toBe('rise');
    expect(await opened.page.locator('tr[aria-selected="true"] td').first().textContent()).toBe('rise');
    await opened.send({ type: 'cursorElement', element: null });
    expect(await opened.page.locator('.is-current, tr[aria-selected="true"]').count()).toBe(0);
  });

  test('arrows read values and say them; plus zooms about them; 0 shows all', async () => {
    const surface = opened.page.locator('.surface').first();
    await surface.focus();
    await opened.page.keyboard.press('ArrowRight');
    const card = opened.page.locator('.plot-card').first();
    const said = (await card.locator('[aria-live]').textContent()) ?? '';
    expect(said).toMatch(/^1[23](\.\d)? GHz: Whole path [\d.]+ dB, breakout to twinax [\d.]+ dB$/);
    expect(await card.locator('.reading').textContent()).toBe(said);
    await opened.page.keyboard.press('+');
    const [from, to] = (await zoomOf('insertion-loss'))!;
    expect(to - from).toBeCloseTo(25.78125e9 / 2, -3);
    await opened.page.keyboard.press('0');
    expect(await zoomOf('insertion-loss')).toBeUndefined();
  });

  test('the wheel zooms around the pointer while Control is held, and scrolls otherwise', async () => {
    const box = (await opened.page.locator('.surface').first().boundingBox())!;
    await opened.page.mouse.move(box.x + box.width / 2, box.y + box.height / 2);
    await opened.page.mouse.wheel(0, -50);
    expect(await zoomOf('insertion-loss')).toBeUndefined();
    const moved = (await opened.page.locator('.surface').first().boundingBox())!;
    await opened.page.mouse.move(moved.x + moved.width / 2, moved.y + moved.height / 2);
    await opened.page.keyboard.down('Control');
    await opened.page.mouse.wheel(0, -100);
    await opened.page.keyboard.up('Control');
    await expect.poll(() => zoomOf('insertion-loss')).toBeDefined();
  });

  test('a drag zooms to what it covers, a double click shows all', async () => {
    const box = (await opened.page.locator('.surface').first().boundingBox())!;
    const y = box.y + box.height / 2;
    await opened.page.mouse.move(box.x + 150, y);
    await opened.page.mouse.down();
    await opened.page.mouse.move(box.x + 250, y + 3, { steps: 4 });
    await opened.page.mouse.up();
    const [from, to] = (await zoomOf('insertion-loss'))!;
    expect(to - from).toBeGreaterThan(2e9);
    expect(to - from).toBeLessThan(12e9);
    await opened.page.mouse.dblclick(box.x + 200, y);
    expect(await zoomOf('insertion-loss')).toBeUndefined();
  });

  test('SVG and CSV hand over what is drawn', async () => {
    const card = opened.page.locator('.plot-card').first();
    await card.getByRole('button', { name: 'Save as SVG' }).click();
    await card.getByRole('button', { name: 'Save as CSV' }).click();
    const [svg, csv] = (await opened.sent()).slice(-2) as { format: string; name: string; content: string }[];
    expect(svg).toMatchObject({ type: 'save', format: 'svg', name: 'insertion-loss' });
    expect(svg.content).toContain('<svg xmlns="http://www.w3.org/2000/svg"');
    expect(svg.content).not.toContain('var(');
    const faults = await opened.page.evaluate(
      (text) => new DOMParser().parseFromString(text, 'image/svg+xml').querySelectorAll('parsererror').length,
      svg.content,
    );
    expect(faults).toBe(0);
    expect(csv.content.split('\r\n')[0]).toBe('Frequency (Hz),Whole path (dB),breakout to twinax (dB)');
  });
});

describe('updates', () => {
  test('equal data touches no plot; a changed one is redrawn alone; zoom and scroll stay', async () => {
    await opened.send(dataMessage());
    await opened.page.locator('.surface').first().focus();
    await opened.page.keyboard.press('+');
    await opened.page.evaluate(() => {
      document.documentElement.scrollTop = 300;
      for (const svg of document.querySelectorAll('svg.plot')) svg.setAttribute('data-seen', '1');
    });
    await opened.send(dataMessage());
    expect(await opened.page.locator('svg.plot[data-seen]').count()).toBe(3);
    const data = exampleData();
    const plots = data.plots.map((plot) =>
      plot.name === 'single-bit' ? { ...plot, description: { ...plot.description!, summary: 'Other.' } } : plot,
    );
    await opened.send(dataMessage({ ...data, plots }));
    expect(await opened.page.locator('svg.plot[data-seen]').count()).toBe(2);
    expect(await opened.page.evaluate(() => document.documentElement.scrollTop)).toBe(300);
    expect(await zoomOf('insertion-loss')).toBeDefined();
  });

  test('the focused mark keeps the focus when its plot is redrawn', async () => {
    await opened.send(dataMessage());
    await opened.page.locator('[data-element="dive"]').focus();
    const data = exampleData();
    await opened.send(
      dataMessage({
        ...data,
        plots: data.plots.map((plot) => ({
          ...plot,
          description: plot.description && { ...plot.description, summary: 'New.' },
        })),
      }),
    );
    expect(await opened.page.evaluate(() => document.activeElement?.getAttribute('data-element'))).toBe('dive');
  });

  test('a stale eye is marked in its title', async () => {
    const data = exampleData();
    const plots = data.plots.map((plot) =>
      plot.name === 'eye' ? { ...plot, description: { ...plot.description!, stale: true } } : plot,
    );
    await opened.send(dataMessage({ ...data, stale: true, plots }));
    expect(await opened.page.locator('#eye-heading').textContent()).toBe('~ Statistical eye');
    expect(await opened.page.locator('#insertion-loss-heading').textContent()).toBe('Insertion loss');
  });

  test('zoom, open tables and selection survive a reload', async () => {
    await opened.send(dataMessage());
    await opened.page.locator('.surface').first().focus();
    await opened.page.keyboard.press('+');
    await opened.page.locator('.tools button', { hasText: 'Table' }).first().click();
    await opened.page.locator('.ledger tbody tr').nth(2).click();
    const before = await zoomOf('insertion-loss');
    await opened.page.reload();
    await opened.send(dataMessage());
    expect(await zoomOf('insertion-loss')).toEqual(before);
    expect(await opened.page.locator('.data-table:visible').count()).toBe(1);
    expect(await opened.page.locator('tr[aria-selected="true"] td').first().textContent()).toBe('main-run');
  });
});
