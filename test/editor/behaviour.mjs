// What needs a person's hands or an unusual window: save dialog, reload, restart, an untrusted folder, several folders.
import { execFileSync } from 'node:child_process';
import { cpSync, existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { openLane, pictures } from './interface.mjs';
import { command, goToLine, poll, previewFrame } from './page.mjs';
import { startWorkbench } from './workbench.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
const line = (page, text) => page.locator('.monaco-editor .view-line', { hasText: text }).first();
const squiggle = (page) => page.locator('.squiggly-error').first();
const plots = (frame) => poll(async () => (await frame.locator('#preview svg').count()) >= 5, 'the plots');

/** Language servers of ours below a workbench, by the process table. */
function serversBelow(workbench) {
  const rows = execFileSync('ps', ['-eo', 'pid=,ppid=,args='], { encoding: 'utf8' })
    .split('\n')
    .map((row) => /^\s*(\d+)\s+(\d+)\s+(.*)$/.exec(row))
    .filter(Boolean);
  const parent = new Map(rows.map(([, pid, ppid]) => [pid, ppid]));
  const isBelow = (pid) => pid !== undefined && (pid === String(workbench.pid) || isBelow(parent.get(pid)));
  return rows
    .filter(([, pid, , args]) => args.includes(join('dist', 'server.cjs')) && isBelow(pid))
    .map(([, pid]) => Number(pid));
}

/** Whether the status bar counts any error or warning in the window. */
const hasProblems = async (page) => /[1-9]/.test((await page.locator('[id="status.problems"]').textContent()) ?? '');

/** The words at a place in the text have the colour of their kind. */
const colourOf = (page, row, word) =>
  line(page, row).evaluate((element, text) => {
    const span = [...element.querySelectorAll('span span')].find(
      ({ textContent }) => textContent.replace(/\u00a0/g, ' ').trim() === text,
    );
    return span && getComputedStyle(span).color;
  }, word);

/** Each: what must hold, in a window of its own folder. */
const behaviours = [
  {
    title: 'kinds, keys, quantities and names have colours of their own',
    async check({ page }) {
      await goToLine(page, 43);
      const colours = [];
      for (const [row, word] of [
        ['- via: dive', 'via'],
        ['drill: 0.25 mm', 'drill'],
        ['drill: 0.25 mm', '0.25'],
        ['stackup: sled.main', 'sled.main'],
      ]) {
        colours.push(await poll(() => colourOf(page, row, word), `\`${word}\` as a word of its own`));
      }
      if (new Set(colours).size !== colours.length) throw new Error(`four unlike colours are wanted, got ${colours}`);
    },
  },
  {
    title: 'a row of the ledger selects its lines, and the cursor marks its row',
    async check({ page, frame }) {
      await frame.locator('.ledger tbody tr', { hasText: 'twinax' }).click();
      await line(page, 'cable: twinax').waitFor();
      await poll(async () => (await page.locator('.monaco-editor .selected-text').count()) >= 5, 'five selected lines');
      await goToLine(page, 43);
      await poll(
        () => frame.locator('.ledger tr[aria-selected="true"]', { hasText: 'dive' }).count(),
        'the row of the via',
      );
    },
  },
  {
    title: 'a plot is saved as SVG and as CSV',
    async check({ page, frame, workspace }) {
      for (const format of ['svg', 'csv']) {
        await frame.getByRole('button', { name: format.toUpperCase() }).first().click();
        const input = page.locator('.quick-input-widget input').first();
        await input.waitFor();
        await poll(async () => (await input.inputValue()).endsWith(`.${format}`), 'the name that is proposed');
        const file = await input.inputValue();
        await page.keyboard.press('Enter');
        if (!file.startsWith(join(workspace, 'lanes'))) throw new Error(`${file} is not beside the channel`);
        const whole =
          format === 'svg' ? /^(?:<\?xml[^>]*>\s*)?<svg[\s\S]*<\/svg>\s*$/ : /^[^\n]+,[^\n]+\n(?:[-\d.e+]+,?)+/;
        await poll(() => existsSync(file) && whole.test(readFileSync(file, 'utf8')), `a whole ${format} in ${file}`);
      }
    },
  },
  {
    // The editor writes a page's state every few seconds, so that the newest of it may be missing after a reload at once.
    title: 'the preview comes back after a reload, locked as it was, at its place and with a marked row',
    async check({ page, frame, workbench, workspace, payload }) {
      await frame.locator('.ledger tbody tr', { hasText: 'main-run' }).click();
      await page.locator('.tab', { hasText: 'Preview: camera-sled' }).click();
      await page.getByRole('button', { name: 'Lock or Unlock the Preview' }).first().click();
      await page.locator('.tab', { hasText: 'Locked preview' }).waitFor();
      await frame.evaluate(() => {
        document.documentElement.scrollTop = 900;
      });
      await poll(() => frame.evaluate(() => document.documentElement.scrollTop > 800), 'the scrolled page');
      // The editor writes its store every 5 s while idle, and nothing on the screen tells when.
      await page.waitForTimeout(8000);
      await page.goto(workbench.address(workspace, payload));
      const again = await previewFrame(page);
      await plots(again);
      await poll(() => again.evaluate(() => document.documentElement.scrollTop > 100), 'the place in the page');
      await poll(() => again.locator('.ledger tr[aria-selected="true"]').count(), 'a marked row');
      await page.locator('.tab', { hasText: 'Locked preview' }).waitFor();
    },
  },
  {
    title: 'a server that dies five times is given up, and started again by the button',
    async check({ page, workbench }) {
      const given = page.locator('.notification-toast', { hasText: 'keeps stopping' });
      let last;
      for (let death = 0; death < 5; death++) {
        const pid = await poll(() => serversBelow(workbench).find((one) => one !== last), 'a new server');
        await poll(() => hasProblems(page), 'findings');
        process.kill(pid, 'SIGKILL');
        last = pid;
        await poll(async () => !(await hasProblems(page)), 'no findings of a dead server');
      }
      await given.waitFor();
      await page.screenshot({ path: join(pictures, 'given-up.png') });
      if (serversBelow(workbench).length) throw new Error('a server runs although it was given up');
      await given.getByRole('button', { name: 'Restart' }).click();
      await squiggle(page).waitFor();
      if (serversBelow(workbench).length !== 1) throw new Error(`one server is wanted, got ${serversBelow(workbench)}`);
    },
  },
];

/** A folder that nobody trusts: the dialog is answered with no, and all of it works. */
async function untrusted(browser, workspace) {
  const workbench = await startWorkbench({
    trust: false,
    settings: { 'security.workspace.trust.enabled': true, 'security.workspace.trust.startupPrompt': 'always' },
  });
  const context = await browser.newContext({ viewport: { width: 1600, height: 1000 } });
  try {
    const page = await context.newPage();
    const payload = [
      ['extensionDevelopmentPath', workbench.remote(root)],
      ['openFile', workbench.remote(join(workspace, 'lanes', 'camera-sled.channel.yaml'))],
    ];
    await page.goto(workbench.address(workspace, payload));
    await page.getByRole('button', { name: /No, I don't trust/ }).click({ timeout: 60_000 });
    await squiggle(page).waitFor({ timeout: 60_000 });
    await line(page, 'GHz').waitFor();
    await page.locator('.part.statusbar', { hasText: 'Restricted Mode' }).waitFor();
    await command(page, 'Lanewright: Open Preview to the Side');
    await plots(await previewFrame(page));
    await page.screenshot({ path: join(pictures, 'untrusted.png') });
  } finally {
    await context.close();
    workbench.stop();
  }
}

/** Two folders in one window, the second with spaces and an umlaut in its path: findings and names of each. */
async function twoFolders(browser, workspace) {
  const second = join(workspace, '..', 'zweite Säge');
  cpSync(join(root, 'examples'), second, { recursive: true });
  const file = join(workspace, '..', 'both.code-workspace');
  writeFileSync(file, JSON.stringify({ folders: [{ path: workspace }, { path: second }] }));
  const workbench = await startWorkbench();
  const context = await browser.newContext({ viewport: { width: 1600, height: 1000 } });
  try {
    const page = await context.newPage();
    const payload = [
      ['extensionDevelopmentPath', workbench.remote(root)],
      ['openFile', workbench.remote(join(second, 'lanes', 'camera-sled.channel.yaml'))],
    ];
    await page.goto(
      workbench.address(workspace, payload).replace(/\?folder=[^&]*/, `?workspace=${encodeURIComponent(file)}`),
    );
    await squiggle(page).waitFor({ timeout: 60_000 });
    await line(page, 'GHz').waitFor();
    await command(page, 'View: Toggle Problems');
    // The list draws only the rows in view: a word that one finding of each folder holds keeps it short.
    await page.locator('.viewpane-filter-container input').first().fill('notch');
    for (const name of ['zweite Säge', workspace.split('/').pop()]) {
      await poll(
        () => page.locator('.markers-panel .monaco-list-row', { hasText: name }).count(),
        `problems of ${name}`,
      );
    }
    await page.screenshot({ path: join(pictures, 'two-folders.png') });
  } finally {
    await context.close();
    workbench.stop();
  }
}

export async function run(browser) {
  mkdirSync(pictures, { recursive: true });
  const outcome = { passed: [], failed: [] };
  const folder = mkdtempSync(join(tmpdir(), 'lanewright-behaviour-'));
  const check = async (title, body, page) => {
    try {
      await body();
      outcome.passed.push(title);
      console.log(`  behaviour: ok ${title}`);
    } catch (error) {
      outcome.failed.push(title);
      console.error(`  behaviour: FAILED ${title}: ${error.message}`);
      await page?.screenshot({ path: join(pictures, `failed-${outcome.failed.length}.png`) });
    }
  };
  try {
    const workspace = join(folder, 'sorter');
    cpSync(join(root, 'examples'), workspace, { recursive: true });
    const workbench = await startWorkbench();
    try {
      const { context, page } = await openLane(browser, { workspace, workbench });
      await command(page, 'Lanewright: Open Preview to the Side');
      const frame = await previewFrame(page);
      await plots(frame);
      const window = {
        page,
        frame,
        workbench,
        workspace,
        payload: [['extensionDevelopmentPath', workbench.remote(root)]],
      };
      for (const { title, check: body } of behaviours) await check(title, () => body(window), page);
      await context.close();
    } finally {
      workbench.stop();
    }
    await check('an untrusted folder has findings, hints and preview', () => untrusted(browser, workspace));
    await check('two folders in one window are each computed, with spaces and umlauts in a path', () =>
      twoFolders(browser, workspace),
    );
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
  return outcome;
}
