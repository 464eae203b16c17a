// What a person does in the workbench, by keyboard and by what is seen.
export const editorText = (page) => page.locator('.monaco-editor .view-lines').first();

/** The palette's command by its title. */
export async function command(page, title) {
  await page.keyboard.press('F1');
  const input = page.locator('.quick-input-widget input').first();
  await input.waitFor();
  await input.fill(`>${title}`);
  await page.locator('.quick-input-list .monaco-list-row', { hasText: title }).first().waitFor();
  await page.keyboard.press('Enter');
}

/** Puts the cursor at the start of a line. */
export async function goToLine(page, line) {
  await editorText(page).click();
  await page.keyboard.press('Control+g');
  const input = page.locator('.quick-input-widget input').first();
  await input.waitFor();
  await input.fill(`:${line}`);
  await page.keyboard.press('Enter');
  await input.waitFor({ state: 'hidden' });
}

/** The page inside the webview, once it drew something. */
export async function previewFrame(page) {
  const frame = await poll(async () => {
    for (const candidate of page.frames()) {
      if (!/fake\.html|\/webview\/browser\/pre\//.test(candidate.url())) continue;
      if (
        await candidate
          .locator('#preview svg')
          .count()
          .catch(() => 0)
      )
        return candidate;
    }
    return undefined;
  }, 'the preview');
  return frame;
}

export async function poll(ask, what, ceilingMilliseconds = 30_000) {
  const end = Date.now() + ceilingMilliseconds;
  for (;;) {
    const answer = await ask();
    if (answer) return answer;
    if (Date.now() > end) throw new Error(`${what}: not within ${ceilingMilliseconds / 1000} s`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}
