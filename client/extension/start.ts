import * as vscode from 'vscode';
import {
  type BaseLanguageClient,
  CloseAction,
  ErrorAction,
  type LanguageClientOptions,
  RevealOutputChannelOn,
  State,
} from 'vscode-languageclient';
import { registerCommands } from './commands';
import { type Deaths, rememberDeaths } from './deaths';
import { serveFiles } from './files';
import { type Host, SELECTOR } from './host';
import { registerPreview } from './preview-panel';
import { analysing } from './protocol';
import { type StatusItem, statusItem } from './status';

let running: BaseLanguageClient | undefined;

/** What commands, preview and tests need of the running extension. */
export interface Extension {
  readonly client: BaseLanguageClient;
  readonly host: Host['name'];
  readonly output: vscode.LogOutputChannel;
  readonly deaths: Deaths;
  /** Starts the server anew, also one that hangs. */
  restart(): Promise<void>;
}

export function start(context: vscode.ExtensionContext, host: Host): Extension {
  const output = vscode.window.createOutputChannel('Lanewright', { log: true });
  const status = statusItem(context);
  const deaths = rememberDeaths();
  const client = host.createClient(context, clientOptions(context, output, status, deaths));
  running = client;
  const extension: Extension = {
    client,
    host: host.name,
    output,
    deaths,
    restart: () => restart(client, output, status),
  };

  status.starting();
  context.subscriptions.push(
    output,
    client.onDidChangeState(({ newState }) => {
      if (newState === State.Running) status.running();
    }),
    client.onNotification(analysing, ({ uri, running: isRunning }) => deaths.analysing(uri, isRunning)),
    serveFiles(client),
    registerPreview(context, extension),
    registerCommands(context, extension),
  );
  // Not awaited: the editor counts until this returns, and what is asked before the server is there waits for it.
  client.start().catch((error: unknown) => {
    output.error(`The server could not be started: ${error instanceof Error ? error.message : String(error)}`);
    status.stopped();
  });
  return extension;
}

export const stop = async () => running?.stop();

function clientOptions(
  context: vscode.ExtensionContext,
  output: vscode.LogOutputChannel,
  status: StatusItem,
  deaths: Deaths,
): LanguageClientOptions {
  return {
    documentSelector: SELECTOR,
    outputChannel: output,
    revealOutputChannelOn: RevealOutputChannelOn.Never,
    initializationOptions: () => ({
      skip: deaths.skipped(),
      rulesReference: vscode.Uri.joinPath(context.extensionUri, 'dist', 'rules.md').toString(),
      version: context.extension.packageJSON.version,
    }),
    errorHandler: {
      error: () => ({ action: ErrorAction.Continue }),
      closed: () => {
        const { restart, skippedNow } = deaths.died();
        for (const uri of skippedNow)
          output.warn(`${uri} is opened without analysis: its analysis was running when the server stopped, twice.`);
        if (restart) {
          output.warn('The server stopped and is started again.');
          status.restarting();
          return { action: CloseAction.Restart, handled: true };
        }
        output.error('The server stopped five times within three minutes and is not started again.');
        status.stopped();
        void vscode.window
          .showErrorMessage('Lanewright’s server keeps stopping.', 'Restart', 'Show output')
          .then((choice) => {
            if (choice === 'Restart') return vscode.commands.executeCommand('lanewright.restartServer');
            if (choice === 'Show output') output.show();
            return undefined;
          });
        return { action: CloseAction.DoNotRestart, handled: true };
      },
    },
  };
}

/** `stop` gives up on a server that does not answer within 2 s and throws: it is then replaced all the same. */
async function restart(client: BaseLanguageClient, output: vscode.LogOutputChannel, status: StatusItem): Promise<void> {
  status.forgive();
  try {
    if (client.needsStop()) await client.stop();
  } catch (error) {
    output.warn(`The server did not answer and is replaced: ${error instanceof Error ? error.message : String(error)}`);
  }
  await client.start();
}
