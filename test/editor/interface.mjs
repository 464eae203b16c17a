// The real workbench driven like a person would: typing, squiggles, hints, quick fix, preview; in each theme. Leaves pictures.
import { cpSync, mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { command, goToLine, poll, previewFrame } from './page.mjs';
import { startWorkbench } from './workbench.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
export const pictures = join(root, 'test-results', 'pictures');

/** By name: the theme's title in the picker and the class that the workbench then carries. */
const THEMES = {
  light: ['Light Modern', 'vs'],
  dark: ['Dark Modern', 'vs-dark'],
  'high-contrast': ['Dark High Contrast', 'hc-black'],
  'high-contrast-light': ['Light High Contrast', 'hc-light'],
};

/** Chosen as a person would: this workbench does not take the theme from a settings file. */
async function chooseTheme(page, [title, themeClass]) {
  await page.keyboard.press('Control+k');
  await page.keyboard.press('Control+t');
  const input = page.locator('.quick-input-widget input').first();
  await page.locator('.quick-input-list .monaco-list-row', { hasText: 'Modern' }).first().waitFor();
  await input.fill(title);
  await page.locator('.quick-input-list .monaco-list-row.focused', { hasText: title }).first().waitFor();
  await page.keyboard.press('Enter');
  await page.locator(`.monaco-workbench.${themeClass}`).waitFor();
}

/** A via typed before the cable, key by key as a person would. */
const NEW_VIA = ['- via: extra', 'stackup: sled.main', 'drill: 0.25 mm', 'antipad: 0.85 mm', 'pitch: 0.9 mm', 'to: L6'];

export async function openLane(browser, { lane = 'camera-sled', workspace, extension = true, workbench }) {
  const context = await browser.newContext({ viewport: { width: 1600, height: 1000 } });
  const page = await context.newPage();
  const payload = [['openFile', workbench.remote(join(workspace, 'lanes', `${lane}.channel.yaml`))]];
  if (extension) payload.push(['extensionDevelopmentPath', workbench.remote(root)]);
  await page.goto(workbench.address(workspace, payload));
  await page.locator('.monaco-editor .view-line').first().waitFor({ timeout: 60_000 });
  await page.locator('.squiggly-error, .squiggly-warning').first().waitFor({ timeout: 60_000 });
  return { context, page };
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
    const workbench = await startWorkbench();
    let page;
    await check(`${name}: text with squiggle and hints, preview beside it`, async () => {
      ({ page } = await openLane(browser, { workspace, workbench }));
      await page.locator('.monaco-editor .view-line', { hasText: 'GHz' }).first().waitFor();
      await chooseTheme(page, theme);
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
