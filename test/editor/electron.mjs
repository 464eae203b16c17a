// `npm run test:electron`: the same suite in a desktop editor, for those who have network: @vscode/test-electron downloads it.
import { cpSync, mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { runTests } from '@vscode/test-electron';
import { setUp } from '../../tasks.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
await setUp({ tests: true });
const workspace = mkdtempSync(join(tmpdir(), 'lanewright-workspace-'));
cpSync(join(root, 'examples'), workspace, { recursive: true });
process.exitCode = await runTests({
  extensionDevelopmentPath: root,
  extensionTestsPath: join(root, 'dist', 'test', 'suite.cjs'),
  launchArgs: [workspace, '--disable-extensions'],
}).catch((error) => {
  console.error(`The desktop editor could not be run: ${error.message}`);
  return 1;
});
