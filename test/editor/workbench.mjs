// A real VS Code without downloads outside the npm registry: its own server and web workbench, started here and opened in Chromium.
import { spawn, spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

const folder = join(dirname(fileURLToPath(import.meta.url)), 'workbench');
const vscode = join(folder, 'node_modules', 'code-server', 'lib', 'vscode');
const serverMain = join(vscode, 'out', 'server-main.js');

function npm(args, cwd) {
  const { status } = spawnSync('npm', [...args, '--ignore-scripts', '--no-audit', '--no-fund', '--loglevel=error'], {
    cwd,
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  if (status !== 0) throw new Error(`npm ${args.join(' ')} failed in ${cwd}`);
}

/** Installs the workbench on first use. */
export function installWorkbench() {
  if (existsSync(join(vscode, '.installed'))) return;
  console.error('Installing the editor workbench …');
  if (!existsSync(serverMain)) npm(['ci'], folder);
  // Its own dependencies: the published package carries a shrinkwrap, which `npm ci` finds incomplete.
  npm(['install', '--omit=dev'], vscode);
  writeFileSync(join(vscode, '.installed'), '');
}

function freePort() {
  return new Promise((resolve, reject) => {
    const probe = createServer().on('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address();
      probe.close(() => resolve(port));
    });
  });
}

const baseSettings = {
  'workbench.startupEditor': 'none',
  'workbench.tips.enabled': false,
  'extensions.autoUpdate': false,
  'extensions.autoCheckUpdates': false,
  'git.openRepositoryInParentFolders': 'never',
  'workbench.colorTheme': 'Default Light Modern',
  'editor.minimap.enabled': false,
  'security.workspace.trust.enabled': false,
};

/**
 * Starts the workbench's server on a fresh data folder.
 * @returns its port, address builder and `stop`
 */
export async function startWorkbench({ settings = {}, trust = true, installVsix } = {}) {
  installWorkbench();
  const data = mkdtempSync(join(tmpdir(), 'lanewright-workbench-'));
  mkdirSync(join(data, 'data', 'Machine'), { recursive: true });
  writeFileSync(join(data, 'data', 'Machine', 'settings.json'), JSON.stringify({ ...baseSettings, ...settings }));
  if (installVsix) {
    const { status } = spawnSync(
      process.execPath,
      [serverMain, '--install-extension', installVsix, '--server-data-dir', data, '--accept-server-license-terms'],
      { stdio: ['ignore', 'ignore', 'inherit'] },
    );
    if (status !== 0) throw new Error(`${installVsix} could not be installed.`);
  }
  const port = await freePort();
  const args = [
    '--host',
    '127.0.0.1',
    '--port',
    String(port),
    '--without-connection-token',
    '--accept-server-license-terms',
    '--server-data-dir',
    data,
    '--disable-telemetry',
  ];
  if (trust) args.push('--disable-workspace-trust');
  const server = spawn(process.execPath, [serverMain, ...args], { stdio: ['ignore', 'pipe', 'pipe'] });
  let log = '';
  await new Promise((resolve, reject) => {
    const limit = setTimeout(() => reject(new Error(`The workbench did not start within 60 s.\n${log}`)), 60_000);
    const listen = (chunk) => {
      log += chunk;
      if (/listening/i.test(log)) {
        clearTimeout(limit);
        resolve();
      }
    };
    server.stdout.on('data', listen);
    server.stderr.on('data', listen);
    server.once('exit', (code) => reject(new Error(`The workbench ended with ${code}.\n${log}`)));
  });
  const remote = (path) => `vscode-remote://127.0.0.1:${port}${path}`;
  return {
    port,
    pid: server.pid,
    data,
    remote,
    /** @param payload pairs as the workbench knows them */
    address: (workspace, payload) =>
      `http://127.0.0.1:${port}/?folder=${encodeURIComponent(workspace)}&payload=${encodeURIComponent(JSON.stringify([['skipWelcome', 'true'], ...payload]))}`,
    stop() {
      server.kill();
      rmSync(data, { recursive: true, force: true });
    },
  };
}

/** Serves `extension` to the browser's worker host: everything below `/ext/`, and the page told to load it from there. */
export async function serveAsWebExtension(context, { port, extension, suite }) {
  const here = (path) => ({ $mid: 1, scheme: 'http', authority: `127.0.0.1:${port}`, path });
  await context.route(
    (url) => url.pathname.startsWith('/ext/'),
    (route) => {
      const path = join(extension, decodeURIComponent(new URL(route.request().url()).pathname.slice('/ext/'.length)));
      if (!existsSync(path)) return route.fulfill({ status: 404, body: '' });
      const type = path.endsWith('.json')
        ? 'application/json'
        : path.endsWith('.js')
          ? 'text/javascript'
          : path.endsWith('.css')
            ? 'text/css'
            : 'application/octet-stream';
      return route.fulfill({
        status: 200,
        contentType: type,
        headers: { 'access-control-allow-origin': '*' },
        body: readFileSync(path),
      });
    },
  );
  await context.route(
    (url) => url.pathname === '/',
    async (route) => {
      const response = await route.fetch();
      const html = await response.text();
      const changed = html.replace(
        /(id="vscode-workbench-web-configuration"[^>]*data-settings=")([^"]*)(")/,
        (_all, before, json, after) => {
          const settings = JSON.parse(json.replace(/&quot;/g, '"').replace(/&amp;/g, '&'));
          settings.developmentOptions = {
            ...settings.developmentOptions,
            extensions: [here('/ext')],
            ...(suite && { extensionTestsPath: here(suite) }),
          };
          return before + JSON.stringify(settings).replace(/&/g, '&amp;').replace(/"/g, '&quot;') + after;
        },
      );
      if (changed === html) throw new Error('The workbench page has no settings to add the extension to.');
      return route.fulfill({ response, body: changed });
    },
  );
}
