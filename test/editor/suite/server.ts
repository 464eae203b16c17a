import * as vscode from 'vscode';
import { equal, finding, findingsOf, ok, open, replace, revert, ruleOf, until } from './harness';

interface Running {
  readonly host: 'node' | 'browser';
  readonly client: {
    serverProcess?: { pid?: number; kill(signal: string): boolean };
    isRunning(): boolean;
    sendRequest<T>(method: string, params: unknown): Promise<T>;
  };
  readonly deaths: {
    analysing(uri: string, running: boolean): void;
    died(): { restart: boolean };
    skipped(): readonly string[];
    forgive(): void;
  };
  restart(): Promise<void>;
}

const SLED = 'lanes/camera-sled.channel.yaml';
const EJECTOR = 'lanes/ejector.channel.yaml';
/** Findings are back so soon after the server was killed. */
const BACK_MILLISECONDS = 2000;

export function defineServerTests(): void {
  const running = async () => {
    const found = vscode.extensions.getExtension<Running>('lanewright.lanewright');
    ok(found, 'the extension is installed');
    return found.activate();
  };
  const idle = ({ client }: Running) =>
    until('a server at rest', async () => {
      const status = await client
        .sendRequest<{ busy: boolean; keptAnalyses: number }>('lanewright/status', {})
        .catch(() => undefined);
      return status && !status.busy && status.keptAnalyses > 0;
    });
  const openFilesOnly = (only: boolean) =>
    vscode.workspace
      .getConfiguration('lanewright')
      .update('workspaceDiagnostics', only ? false : undefined, vscode.ConfigurationTarget.Workspace);
  const kill = ({ client }: Running) => {
    const { serverProcess } = client;
    ok(serverProcess, 'a server runs');
    ok(serverProcess.kill('SIGKILL'), 'the server was killed');
    return until('a death', () => client.serverProcess?.pid !== serverProcess?.pid);
  };

  describe('the server', () => {
    it('starts anew on command, with findings as before', async () => {
      const { document } = await open(SLED);
      await until('the stub', () => finding(document.uri, 'stub-resonance'));
      await vscode.commands.executeCommand('lanewright.restartServer');
      await until('the stub again', () => finding(document.uri, 'stub-resonance'));
    });

    it('opens a file without analysis that was being analysed at two deaths, says so, and tries again when asked', async () => {
      const extension = await running();
      const { document } = await open(SLED);
      await until('the stub', () => finding(document.uri, 'stub-resonance'));
      const uri = document.uri.toString();
      // What a server that dies twice over one file leaves behind; a worker cannot be killed from outside.
      for (let death = 0; death < 2; death++) {
        extension.deaths.analysing(uri, true);
        extension.deaths.died();
      }
      await extension.restart();
      const notAnalysed = await until('the file that is not analysed', () => finding(document.uri, 'not-analysed'));
      equal(findingsOf(document.uri).map(ruleOf), ['not-analysed'], 'findings of that file');
      ok(/without analysis/.test(notAnalysed.message), `it says so, got ${notAnalysed.message}`);
      await vscode.commands.executeCommand('lanewright.analyseAgain', uri);
      await until('the stub, since a person asked', () => finding(document.uri, 'stub-resonance'));
      ok(!finding(document.uri, 'not-analysed'), 'no longer skipped');
      extension.deaths.forgive();
    });

    it('killed three times in a row: findings are back within 2 s, unsaved text is intact', async function () {
      const extension = await running();
      // A worker cannot be killed from outside.
      if (extension.host === 'browser') return this.skip();
      extension.deaths.forgive();
      // Else other files' analyses may run when the server is killed, and rightly count.
      await openFilesOnly(true);
      const editor = await open(EJECTOR);
      await replace(editor, 'length: 64 mm', 'lenght: 64 mm');
      const typed = editor.document.getText();
      const times: number[] = [];
      for (let death = 0; death < 3; death++) {
        await until('the misspelling', () => finding(editor.document.uri, 'schema'));
        await idle(extension);
        const start = Date.now();
        await kill(extension);
        // The editor's list is emptied when the server dies, so that what stands in it afterwards is new.
        await until(
          'the misspelling, told by the new server',
          () => extension.client.isRunning() && finding(editor.document.uri, 'schema'),
        );
        times.push(Date.now() - start);
      }
      console.log(`[suite] note findings back after SIGKILL: ${times.join(', ')} ms`);
      equal(extension.deaths.skipped(), [], 'files skipped after deaths while idle');
      ok(editor.document.getText() === typed, 'the unsaved text is intact');
      ok(Math.min(...times) <= BACK_MILLISECONDS, `within ${BACK_MILLISECONDS} ms, got ${times}`);
      await openFilesOnly(false);
      await revert();
    });

    it('that dies five times is not started again until a person says so', async function () {
      const extension = await running();
      if (extension.host === 'browser') return this.skip();
      extension.deaths.forgive();
      const { document } = await open(SLED);
      for (let death = 0; death < 5; death++) {
        await until('the stub', () => finding(document.uri, 'stub-resonance'));
        await idle(extension);
        await kill(extension);
      }
      await until('a server that stays away', () => !extension.client.isRunning());
      await vscode.commands.executeCommand('lanewright.restartServer');
      await until(
        'the stub, since a person said so',
        () => extension.client.isRunning() && finding(document.uri, 'stub-resonance'),
      );
    });
  });
}
