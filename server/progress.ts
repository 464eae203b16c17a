import type { Connection, WorkDoneProgressServerReporter } from 'vscode-languageserver';

const QUIET_MILLISECONDS = 500;

/** Tells of work only when it takes longer than half a second: what is done at once needs no flicker. */
export interface Progress {
  working(label: string): Promise<void>;
  idle(): void;
}

export function keepProgress(connection: Connection, isSupported: () => boolean, now: () => number): Progress {
  let since: number | undefined;
  let reporter: Promise<WorkDoneProgressServerReporter | undefined> | undefined;
  return {
    async working(label) {
      since ??= now();
      if (!isSupported() || now() - since < QUIET_MILLISECONDS) return;
      if (!reporter) {
        reporter = connection.window.createWorkDoneProgress().catch(() => undefined);
        (await reporter)?.begin('Lanewright', undefined, label);
      } else (await reporter)?.report(label);
    },
    idle() {
      since = undefined;
      const ended = reporter;
      reporter = undefined;
      void ended?.then((one) => one?.done());
    },
  };
}
