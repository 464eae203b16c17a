import * as vscode from 'vscode';
import type { BaseLanguageClient } from 'vscode-languageclient';
import { waiverRequest } from './protocol';

/** What the server's code action hands over. */
export interface AcceptFinding {
  readonly uri: string;
  readonly rule: string;
  readonly at: string;
  readonly value?: string;
  readonly message: string;
}

const inHalfAYear = () => new Date(Date.now() + 183 * 24 * 3600 * 1000).toISOString().slice(0, 10);

function dayProblem(text: string): string | undefined {
  if (!/^\d{4}-\d{2}-\d{2}$/.test(text) || Number.isNaN(Date.parse(text))) return 'Write the day as YYYY-MM-DD.';
  return text < new Date().toISOString().slice(0, 10)
    ? 'That day is past: the waiver would accept nothing.'
    : undefined;
}

const wanted = (what: string) => (text: string) =>
  text.trim() ? undefined : `${what} is wanted: a waiver without it is none.`;

/** Asks why, by whom and until when, then writes the waiver. Escape at any question writes nothing. */
export const acceptFinding = (client: BaseLanguageClient) => async (finding: AcceptFinding) => {
  const title = `Accept ${finding.rule} at ${finding.at}`;
  const ask = (prompt: string, value: string, validateInput: (text: string) => string | undefined) =>
    vscode.window.showInputBox({ title, prompt, value, validateInput, ignoreFocusOut: true });

  const reason = await ask(`${finding.message} Why is it acceptable?`, '', wanted('A reason'));
  if (reason === undefined) return;
  const by = await ask('Who accepts it?', '', wanted('A name or team'));
  if (by === undefined) return;
  const until = await ask('Until which day?', inHalfAYear(), dayProblem);
  if (until === undefined) return;
  const upTo =
    finding.value === undefined
      ? undefined
      : await ask('Up to which value? Beyond it the finding returns.', finding.value, () => undefined);
  if (finding.value !== undefined && upTo === undefined) return;

  const { uri, rule, at } = finding;
  const edit = await client.sendRequest(waiverRequest, { uri, rule, at, until, by, reason, ...(upTo && { upTo }) });
  const converted = edit && (await client.protocol2CodeConverter.asWorkspaceEdit(edit));
  if (!converted || !(await vscode.workspace.applyEdit(converted)))
    void vscode.window.showErrorMessage('The waiver could not be written: open the file and try again.');
};
