// The packaged extension, installed as a user installs it, in an editor without a development path; and in a workspace nobody trusted yet.
import { cpSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { makePackage } from '../package.mjs';
import { openLane } from './interface.mjs';
import { startWorkbench } from './workbench.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');

export async function run(browser) {
  const outcome = { passed: [], failed: [] };
  const title = 'the installed package shows findings';
  const workspace = mkdtempSync(join(tmpdir(), 'lanewright-workspace-'));
  cpSync(join(root, 'examples'), workspace, { recursive: true });
  let workbench;
  try {
    const installVsix = await makePackage({ build: false });
    workbench = await startWorkbench({ installVsix });
    const { context, page } = await openLane(browser, { workspace, extension: false, workbench });
    await page.locator('.monaco-editor .view-line', { hasText: 'GHz' }).first().waitFor();
    await context.close();
    outcome.passed.push(title);
    console.log(`  installed: ok ${title}`);
  } catch (error) {
    outcome.failed.push(title);
    console.error(`  installed: FAILED ${title}: ${error.message}`);
  } finally {
    workbench?.stop();
    rmSync(workspace, { recursive: true, force: true });
  }
  return outcome;
}
