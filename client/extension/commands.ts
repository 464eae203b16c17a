import * as vscode from 'vscode';
import { acceptFinding } from './accept-finding';
import { newChannel } from './new-channel';
import { analyseAgain, statusRequest } from './protocol';
import type { Extension } from './start';

/** One command, one line; what takes more has its own file. */
export function registerCommands(context: vscode.ExtensionContext, extension: Extension): vscode.Disposable {
  const { client, output, deaths, host } = extension;
  const commands: Record<string, (...args: never[]) => unknown> = {
    'lanewright.restartServer': async () => {
      deaths.forgive();
      await extension.restart();
    },
    'lanewright.showOutput': () => output.show(),
    'lanewright.copyReport': async () => {
      const status = await client.sendRequest(statusRequest, {}).catch(() => undefined);
      const facts = {
        extension: context.extension.packageJSON.version,
        editor: vscode.version,
        host,
        platform: vscode.env.uiKind === vscode.UIKind.Web ? 'web' : 'desktop',
        server: status ?? 'does not answer',
      };
      await vscode.env.clipboard.writeText(
        JSON.stringify(facts, (key, value) => (key === 'skipped' ? (value as string[]).length : value), 2),
      );
      void vscode.window.showInformationMessage(
        'A report for an issue is on the clipboard: versions and counts, no file contents.',
      );
    },
    'lanewright.analyseAgain': async (uri?: string) => {
      const target = uri ?? vscode.window.activeTextEditor?.document.uri.toString();
      if (!target) return;
      deaths.forgive(target);
      await client.sendNotification(analyseAgain, { uri: target });
    },
    'lanewright.acceptFinding': acceptFinding(client),
    'lanewright.newChannel': newChannel,
    'lanewright.showRules': () =>
      vscode.commands.executeCommand(
        'markdown.showPreview',
        vscode.Uri.joinPath(context.extensionUri, 'dist', 'rules.md'),
      ),
    'lanewright.showFormat': () =>
      vscode.commands.executeCommand(
        'markdown.showPreview',
        vscode.Uri.joinPath(context.extensionUri, 'dist', 'format.md'),
      ),
  };
  return vscode.Disposable.from(
    ...Object.entries(commands).map(([name, run]) => vscode.commands.registerCommand(name, run)),
  );
}
