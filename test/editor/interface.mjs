// The real workbench driven like a person would: typing, squiggles, hints, quick fix, preview; in each theme. Leaves pictures.
import { cpSync, mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { command, goToLine, poll, previewFrame } from './page.mjs';
import { startWorkbench } from './workbench.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
export const pictures = join(root, 'test-results', 'pictures');

const THEMES = {
  light: 'Default Light Modern',
  dark: 'Default Dark Modern',
  'high-contrast': 'Default High Contrast',
  'high-contrast-light': 'Default High Contrast Light',
};

/** A via typed before the cable, key by key as a person would. */
const NEW_VIA = ['- via: extra', 'stackup: sled.main', 'drill: 0.25 mm', 'antipad: 0.85 mm', 'pitch: 0.9 mm', 'to: L6'];

export async function openLane(browser, { theme, lane = 'camera-sled', workspace, extension = true, workbench }) {
  const context = await browser.newContext({ viewport: { width: 1600, height: 1000 } });
  const page = await context.newPage();
  const payload = [['openFile', workbench.remote(join(workspace, 'lanes', `${lane}.channel.yaml`))]];
  if (extension) payload.push(['extensionDevelopmentPath', workbench.remote(root)]);
  await page.goto(workbench.address(workspace, payload));
  await page.locator('.monaco-editor .view-line').first().waitFor({ timeout: 60_000 });
  await page.locator('.squiggly-error, .squiggly-warning').first().waitFor({ timeout: 60_000 });
  return { context, page, theme };
}

export async function run(browser) {
  mkdirSync(pictures, { recursive: true });
  const outcome = { passed: [], failed: [] };
  const check = async (title, body) => {
    try {
      await body();
      outcome.passed.push(title);
      console.log(`  interface: ok ${title}`);
    } catch (error) {
      outcome.failed.push(title);
      console.error(`  interface: FAILED ${title}: ${error.message}`);
    }
  };
  for (const [name, theme] of Object.entries(THEMES)) {
    const workspace = mkdtempSync(join(tmpdir(), 'lanewright-workspace-'));
    cpSync(join(root, 'examples'), workspace, { recursive: true });
    const workbench = await startWorkbench({ settings: { 'workbench.colorTheme': theme } });
    let page;
    await check(`${name}: text with squiggle and hints, preview beside it`, async () => {
      ({ page } = await openLane(browser, { theme, workspace, workbench }));
      await page.locator('.monaco-editor .view-line', { hasText: 'GHz' }).first().waitFor();
      await command(page, 'Lanewright: Open Preview to the Side');
      const frame = await previewFrame(page);
      await poll(async () => (await frame.locator('#preview svg').count()) >= 4, 'four plots');
      await page.screenshot({ path: join(pictures, `${name}.png`) });
    });
    if (page && name === 'light') {
      await check('a via typed by hand brings its hint and its finding', async () => {
        await page
          .locator('.view-line', { hasText: 'cable' })
          .first()
          .waitFor()
          .catch(() => {});
        await goToLine(page, 79);
        await poll(
          async () => (await page.locator('.view-line', { hasText: 'twinax' }).count()) > 0,
          'the cable in view',
        );
        const line = await page.evaluate(() => {
          const numbers = [...document.querySelectorAll('.monaco-editor .line-numbers')];
          const row = [...document.querySelectorAll('.monaco-editor .view-line')].find((element) =>
            element.textContent.includes('cable:'),
          );
          const top = row.getBoundingClientRect().top;
          return Number(numbers.find((element) => Math.abs(element.getBoundingClientRect().top - top) < 4).textContent);
        });
        await goToLine(page, line);
        await page.keyboard.press('Home');
        await page.keyboard.press('Control+Shift+Enter');
        await page.keyboard.press('Home');
        await page.keyboard.press('Shift+End');
        for (const [index, words] of NEW_VIA.entries()) {
          await page.keyboard.type(index === 0 ? `  ${words}` : words);
          await page.keyboard.press('Escape');
          if (index < NEW_VIA.length - 1) await page.keyboard.press('Enter');
        }
        await poll(async () => (await page.locator('.view-line', { hasText: /extra/ }).count()) > 0, 'the typed via');
        await page.locator('.squiggly-error, .squiggly-warning').first().waitFor();
        const frame = await previewFrame(page);
        await poll(
          async () => (await frame.locator('#preview').textContent()).includes('extra'),
          'the typed via in the ledger',
        );
        await page.screenshot({ path: join(pictures, 'typed-via.png') });
      });
    }
    await page?.context().close();
    workbench.stop();
    rmSync(workspace, { recursive: true, force: true });
  }
  return outcome;
}
