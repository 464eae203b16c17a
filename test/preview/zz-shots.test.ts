import { test } from 'vitest';
import { bundle, dress, launch, openPage } from '/work/main/test/preview/harness';
import { themes } from '/work/main/test/preview/themes';
import { exampleData } from '/work/main/src-core/plots/testing';
test('shots', async () => {
  const browser = await launch();
  const script = await bundle();
  for (const theme of themes) {
    const context = await browser.newContext({ viewport: { width: 1100, height: 900 } });
    const o = await openPage(context, script, theme);
    await o.send({ type: 'data', uri: 'file:///x', version: 1, data: exampleData() });
    await o.page.locator('.surface').first().focus();
    await o.send({ type: 'cursorElement', element: 'dive' });
    await o.page.screenshot({ path: `/tmp/shot-${theme.name}.png`, fullPage: true });
    const t = await o.page.evaluate(() => 0);
    await context.close();
  }
  await browser.close();
}, 100000);
