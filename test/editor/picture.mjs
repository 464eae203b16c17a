// `node test/editor/picture.mjs`: renews the README's picture from the real editor, and the extension's icon from its drawing.
import { cpSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { chromium } from 'playwright-core';
import { chromiumArguments, findChromium } from './chromium.mjs';
import { indexedPng } from './indexed-png.mjs';
import { openLane } from './interface.mjs';
import { command, goToLine, poll, previewFrame } from './page.mjs';
import { startWorkbench } from './workbench.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
const extension = join(root, 'client', 'extension');
const SIZE = { width: 1440, height: 1010 };

async function drawIcon(browser) {
  const page = await browser.newPage({ viewport: { width: 128, height: 128 } });
  const drawing = readFileSync(join(extension, 'icons', 'lanewright.svg'), 'utf8');
  await page.setContent(`<style>body{margin:0}svg{display:block}</style>${drawing}`);
  await page.screenshot({ path: join(extension, 'icons', 'lanewright.png'), omitBackground: true });
  await page.close();
}

/** The failing lane: its text with hints and a squiggle, beside it the pulse and the eye. */
async function takePicture(browser) {
  const folder = mkdtempSync(join(tmpdir(), 'lanewright-picture-'));
  const workspace = join(folder, 'fruit-sorter');
  cpSync(join(root, 'examples'), workspace, { recursive: true });
  const workbench = await startWorkbench({ settings: { 'workbench.colorTheme': 'Default Light Modern' } });
  try {
    const { page } = await openLane(browser, { workspace, workbench });
    await page.setViewportSize(SIZE);
    await command(page, 'View: Toggle Primary Side Bar Visibility');
    await command(page, 'Lanewright: Open Preview to the Side');
    const frame = await previewFrame(page);
    await poll(async () => (await frame.locator('#preview svg').count()) >= 5, 'the plots');
    await goToLine(page, 58);
    await goToLine(page, 43);
    await poll(
      () => frame.locator('.ledger tr[aria-selected="true"]', { hasText: 'dive' }).count(),
      'the via marked in the ledger',
    );
    await page.locator('.view-line', { hasText: 'GHz' }).first().waitFor();
    await frame.getByRole('heading', { name: 'Single-bit response' }).evaluate((heading) => heading.scrollIntoView());
    await page.locator('.notification-toast').waitFor({ state: 'detached' });
    mkdirSync(join(extension, 'pictures'), { recursive: true });
    // Once more than looks needed: a scroll is painted in the next frame.
    await page.evaluate(() => new Promise((resolve) => requestAnimationFrame(() => requestAnimationFrame(resolve))));
    writeFileSync(join(extension, 'pictures', 'workbench.png'), await indexedPng(browser, await page.screenshot()));
  } finally {
    workbench.stop();
    rmSync(folder, { recursive: true, force: true });
  }
}

const browser = await chromium.launch({ executablePath: findChromium(), args: chromiumArguments });
try {
  await drawIcon(browser);
  await takePicture(browser);
} finally {
  await browser.close();
}
