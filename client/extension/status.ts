import * as vscode from 'vscode';
import { SELECTOR } from './host';

const restarts = (deaths: number) =>
  deaths === 0 ? '' : `; the server stopped ${deaths === 1 ? 'once' : `${deaths} times`} and was started again`;

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
  let deaths = 0;
  return {
    starting: () => set('Lanewright: starting', Information, undefined, true),
    running: () =>
      set(`Lanewright: computing while you type${restarts(deaths)}`, deaths > 0 ? Warning : Information, {
        title: 'Show output',
        command: 'lanewright.showOutput',
      }),
    restarting: () => {
      deaths++;
      set('Lanewright: the server stopped and is started again', Warning, undefined, true);
      vscode.window.setStatusBarMessage('Lanewright: the server stopped and is started again', 10_000);
    },
    /** A person started it anew: what was before no longer matters. */
    forgive: () => {
      deaths = 0;
    },
    stopped: () => set('Lanewright: the server stopped', Failure, restart),
  };
}

export type StatusItem = ReturnType<typeof statusItem>;
