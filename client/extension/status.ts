import * as vscode from 'vscode';
import { SELECTOR } from './host';

/** The one status item: what the server does, and how to start it again. */
export function statusItem(context: vscode.ExtensionContext) {
  const item = vscode.languages.createLanguageStatusItem('lanewright.status', SELECTOR);
  item.name = 'Lanewright';
  context.subscriptions.push(item);
  const set = (
    text: string,
    severity: vscode.LanguageStatusSeverity,
    command: vscode.Command | undefined,
    busy = false,
  ) => {
    item.text = text;
    item.severity = severity;
    item.command = command;
    item.busy = busy;
  };
  const { Information, Warning, Error: Failure } = vscode.LanguageStatusSeverity;
  const restart = { title: 'Restart', command: 'lanewright.restartServer' };
  return {
    starting: () => set('Lanewright: starting', Information, undefined, true),
    running: () =>
      set('Lanewright: computing while you type', Information, {
        title: 'Show output',
        command: 'lanewright.showOutput',
      }),
    restarting: () => set('Lanewright: the server stopped and is started again', Warning, undefined, true),
    stopped: () => set('Lanewright: the server stopped', Failure, restart),
  };
}

export type StatusItem = ReturnType<typeof statusItem>;
