// The same suite in a real editor, in both hosts: desktop-like (Node) and browser worker; then the installed package.
// Writes test-results/editor.json: { passed, failed, byHost }.
import { cpSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { chromium } from 'playwright-core';
import { chromiumArguments, findChromium } from './chromium.mjs';
import { serveAsWebExtension, startWorkbench } from './workbench.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
const results = join(root, 'test-results');
const LIMIT_MILLISECONDS = 180_000;
/** Lines of the suite's own reporter; the editor's own console is not printed. */
const LINE = /\[suite\] (ok|FAILED|note) (.*)/;

/** A copy of the examples, so that tests may write. */
function workspaceCopy() {
  const folder = mkdtempSync(join(tmpdir(), 'lanewright-workspace-'));
  cpSync(join(root, 'examples'), folder, { recursive: true });
  return folder;
}

/** Runs the suite in one host. @returns titles passed and failed */
async function runSuite(browser, host) {
  const workspace = workspaceCopy();
  const workbench = await startWorkbench();
  const context = await browser.newContext({ viewport: { width: 1600, height: 1000 } });
  await context.grantPermissions(['clipboard-read', 'clipboard-write']);
  const page = await context.newPage();
  const outcome = { passed: [], failed: [] };
  const log = [];
  const ended = new Promise((resolve) => {
    const limit = setTimeout(
      () => resolve({ code: 1, why: `no end within ${LIMIT_MILLISECONDS / 1000} s` }),
      LIMIT_MILLISECONDS,
    );
    page.exposeFunction('codeAutomationLog', (_type, args) => {
      const line = args.map(String).join(' ');
      log.push(line);
      const match = LINE.exec(line);
      if (!match) return;
      if (match[1] !== 'note') (match[1] === 'ok' ? outcome.passed : outcome.failed).push(match[2]);
      console.log(`  ${host}: ${match[1]} ${match[2]}`);
    });
    page.exposeFunction('codeAutomationExit', (code) => {
      clearTimeout(limit);
      resolve({ code });
    });
  });
  page.on('console', (message) => log.push(`page: ${message.text()}`));
  try {
    const payload = [['openFile', workbench.remote(join(workspace, 'lanes', 'camera-sled.channel.yaml'))]];
    if (host === 'browser')
      await serveAsWebExtension(context, {
        port: workbench.port,
        extension: root,
        suite: '/ext/dist/test/suite-browser.js',
      });
    else
      payload.push(
        ['extensionDevelopmentPath', workbench.remote(root)],
        ['extensionTestsPath', workbench.remote(join(root, 'dist', 'test', 'suite.cjs'))],
      );
    await page.goto(workbench.address(workspace, payload));
    const { code, why } = await ended;
    if (code !== 0 && outcome.failed.length === 0)
      outcome.failed.push(`${host}: the suite ended with ${code}${why ? ` (${why})` : ''}`);
    if (outcome.failed.length) {
      await page.screenshot({ path: join(results, `editor-${host}.png`) });
      writeFileSync(join(results, `editor-${host}.log`), log.join('\n'));
      for (const title of outcome.failed) console.error(`  ${host}: FAILED ${title}`);
      console.error(`  log and picture: test-results/editor-${host}.log, .png`);
    }
  } finally {
    await context.close();
    workbench.stop();
    rmSync(workspace, { recursive: true, force: true });
  }
  return outcome;
}

/** What the browser's worker host cannot have: nobody can kill a worker from outside. */
const NODE_ONLY = [
  'the server killed three times in a row: findings are back within 2 s, unsaved text is intact',
  'the server that dies five times is not started again until a person says so',
];

/** Both hosts run the same tests but for the few listed. @returns what differs beyond them */
function differences({ node, browser }) {
  if (!node || !browser) return [];
  const ran = (outcome) => new Set([...outcome.passed, ...outcome.failed]);
  const [inNode, inBrowser] = [ran(node), ran(browser)];
  const onlyNode = [...inNode].filter((title) => !inBrowser.has(title));
  const onlyBrowser = [...inBrowser].filter((title) => !inNode.has(title));
  console.log(`Node: ${inNode.size} tests; browser worker: ${inBrowser.size}. In Node alone: ${onlyNode.length}`);
  for (const title of onlyNode) console.log(`  ${title}`);
  return [
    ...onlyNode
      .filter((title) => !NODE_ONLY.includes(title))
      .map((title) => `in Node alone, though not listed: ${title}`),
    ...NODE_ONLY.filter((title) => !onlyNode.includes(title)).map(
      (title) => `listed for Node alone, though it is not: ${title}`,
    ),
    ...onlyBrowser.map((title) => `in the browser alone: ${title}`),
  ];
}

async function main() {
  mkdirSync(results, { recursive: true });
  const wanted = process.argv.slice(2);
  const browser = await chromium.launch({ executablePath: findChromium(), args: chromiumArguments });
  const byHost = {};
  try {
    for (const host of ['node', 'browser']) {
      if (wanted.length && !wanted.includes(host)) continue;
      byHost[host] = await runSuite(browser, host);
    }
    for (const [name, file] of [
      ['interface', './interface.mjs'],
      ['behaviour', './behaviour.mjs'],
      ['installed', './installed.mjs'],
    ]) {
      if (wanted.length && !wanted.includes(name)) continue;
      byHost[name] = await (await import(file)).run(browser);
    }
  } finally {
    await browser.close();
  }
  const unlike = differences(byHost);
  if (unlike.length) byHost.hosts = { passed: [], failed: unlike };
  for (const problem of unlike) console.error(`  hosts: FAILED ${problem}`);
  const count = (which) => Object.values(byHost).reduce((sum, outcome) => sum + outcome[which].length, 0);
  const summary = { passed: count('passed'), failed: count('failed'), byHost };
  writeFileSync(join(results, 'editor.json'), JSON.stringify(summary, null, 2));
  for (const [host, { passed, failed }] of Object.entries(byHost))
    console.log(`${host}: ${passed.length} passed, ${failed.length} failed`);
  process.exitCode = summary.failed ? 1 : 0;
}

main().catch((error) => {
  console.error(error);
  process.exitCode = 1;
});
