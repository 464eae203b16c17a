import * as vscode from 'vscode';
import { finding, ok, open, replace, revert, until } from './harness';

interface Running {
  readonly host: 'node' | 'browser';
  readonly client: {
    serverProcess?: { pid?: number; kill(signal: string): boolean };
    sendNotification(method: string, params: unknown): Promise<void>;
  };
}

export function defineServerTests(): void {
  const extension = () => {
    const found = vscode.extensions.getExtension<Running>('lanewright.lanewright');
    ok(found, 'the extension is installed');
    return found;
  };

  describe('the server', () => {
    it('starts anew on command, with findings as before', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      await until('the stub', () => finding(document.uri, 'stub-resonance'));
      await vscode.commands.executeCommand('lanewright.restartServer');
      await until('the stub again', () => finding(document.uri, 'stub-resonance'));
    });

    it('killed three times in a row: findings are back, unsaved text is intact', async function () {
      const { host, client } = await extension().activate();
      // A worker cannot be killed from outside.
      if (host === 'browser') return this.skip();
      const editor = await open('lanes/ejector.channel.yaml');
      await replace(editor, 'length: 64 mm', 'lenght: 64 mm');
      const typed = editor.document.getText();
      for (let death = 0; death < 3; death++) {
        await until('the misspelling', () => finding(editor.document.uri, 'schema'), 20_000);
        const pid = client.serverProcess?.pid;
        ok(client.serverProcess?.kill('SIGKILL'), 'the server was killed');
        await until('a new server', () => client.serverProcess?.pid !== undefined && client.serverProcess.pid !== pid);
      }
      await until('the misspelling, after three deaths', () => finding(editor.document.uri, 'schema'), 20_000);
      ok(editor.document.getText() === typed, 'the unsaved text is intact');
      await revert();
    });
  });
}
