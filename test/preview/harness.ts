import { readFileSync } from 'node:fs';
import { build } from 'esbuild';
import { type Browser, type BrowserContext, chromium, type Page } from 'playwright-core';
import { pageHtml } from '../../client/preview/html';
import type { ToPage } from '../../client/preview/messages';
import type { Theme } from './themes';

const origin = 'http://preview.test';

export const launch = (): Promise<Browser> =>
  chromium.launch({
    executablePath: process.env.LANEWRIGHT_CHROMIUM ?? '/usr/bin/chromium',
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  });

/** The page's script as it is shipped. */
export async function bundle(): Promise<string> {
  const entry = new URL('../../client/preview/page.ts', import.meta.url).pathname;
  const { outputFiles } = await build({
    entryPoints: [entry],
    bundle: true,
    minify: true,
    write: false,
    format: 'iife',
    platform: 'browser',
  });
  return outputFiles[0].text;
}

export interface Opened {
  readonly page: Page;
  /** Messages that the page sent to its host. */
  sent(): Promise<Record<string, unknown>[]>;
  state(): Promise<Record<string, unknown>>;
  send(message: ToPage): Promise<void>;
  violations(): Promise<string[]>;
}

/** Opens the real page under its own policy, with a double of the host that keeps messages and state. */
export async function openPage(context: BrowserContext, script: string, theme: Theme): Promise<Opened> {
  const page = await context.newPage();
  const style = readFileSync(new URL('../../client/preview/page.css', import.meta.url), 'utf8');
  await page.route(`${origin}/**`, (route) => {
    const { pathname } = new URL(route.request().url());
    if (pathname === '/preview.js') return route.fulfill({ contentType: 'text/javascript', body: script });
    if (pathname === '/preview.css') return route.fulfill({ contentType: 'text/css', body: style });
    const html = pageHtml({
      nonce: 'c2FtcGxlLW5vbmNl',
      cspSource: origin,
      scriptUri: `${origin}/preview.js`,
      styleUri: `${origin}/preview.css`,
    });
    return route.fulfill({ contentType: 'text/html', body: html });
  });
  await page.addInitScript(hostDouble);
  await page.goto(`${origin}/`);
  await dress(page, theme);
  const read = <T>(name: string) =>
    page.evaluate((key) => (window as unknown as Record<string, unknown>)[key], name) as Promise<T>;
  return {
    page,
    sent: () => read('sentMessages'),
    state: () => page.evaluate(() => JSON.parse(sessionStorage.getItem('state') ?? '{}')),
    send: (message) =>
      page
        .evaluate((data) => window.dispatchEvent(new MessageEvent('message', { data })), message as unknown)
        .then(() => undefined),
    violations: () => read('policyViolations'),
  };
}

/** Runs in the page before its own script. */
function hostDouble(): void {
  const shared = window as unknown as {
    sentMessages: unknown[];
    policyViolations: string[];
    acquireVsCodeApi: () => unknown;
  };
  shared.sentMessages = [];
  shared.policyViolations = [];
  document.addEventListener('securitypolicyviolation', (event) =>
    shared.policyViolations.push(`${event.violatedDirective} ${event.sample} ${event.blockedURI}`),
  );
  shared.acquireVsCodeApi = () => ({
    postMessage: (message: unknown) => shared.sentMessages.push(message),
    getState: () => JSON.parse(sessionStorage.getItem('state') ?? 'null'),
    setState: (state: unknown) => sessionStorage.setItem('state', JSON.stringify(state)),
  });
}

/** Sets class and variables as the editor does. */
export async function dress(page: Page, { bodyClass, variables }: Theme): Promise<void> {
  await page.evaluate(
    ([className, entries]) => {
      const root = document.documentElement;
      root.removeAttribute('style');
      for (const [name, value] of Object.entries(entries)) root.style.setProperty(`--vscode-${name}`, value);
      document.body.className = className;
    },
    [bodyClass, variables] as const,
  );
}
