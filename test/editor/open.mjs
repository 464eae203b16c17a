// `npm start`: the examples in an editor with the extension loaded.
import { spawnSync } from 'node:child_process';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { onPath } from './chromium.mjs';
import { startWorkbench } from './workbench.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');

export async function openExamples() {
  const examples = join(root, 'examples');
  const code = onPath('code');
  if (code) {
    console.log(`Opening ${examples} in the desktop editor …`);
    spawnSync(code, [`--extensionDevelopmentPath=${root}`, examples], { stdio: 'inherit' });
    return;
  }
  const workbench = await startWorkbench();
  console.log(
    `\nOpen this address in a browser; Ctrl+C ends it:\n${workbench.address(examples, [
      ['extensionDevelopmentPath', workbench.remote(root)],
      ['openFile', workbench.remote(join(examples, 'lanes', 'camera-sled.channel.yaml'))],
    ])}`,
  );
  process.once('SIGINT', () => {
    workbench.stop();
    process.exit(0);
  });
}
