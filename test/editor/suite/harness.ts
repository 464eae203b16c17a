import * as vscode from 'vscode';

export function ok(condition: unknown, message: string): asserts condition {
  if (!condition) throw new Error(message);
}
export function equal<T>(got: T, wanted: T, what: string): void {
  if (JSON.stringify(got) !== JSON.stringify(wanted))
    throw new Error(`${what}: wanted ${JSON.stringify(wanted)}, got ${JSON.stringify(got)}`);
}

/** Asks until the answer is there; the ceiling is a limit, not a wait. */
export async function until<T>(
  what: string,
  ask: () => T | undefined | false | Promise<T | undefined | false>,
  ceilingMilliseconds = 15_000,
): Promise<T> {
  const end = Date.now() + ceilingMilliseconds;
  for (;;) {
    const answer = await ask();
    if (answer) return answer;
    if (Date.now() > end) throw new Error(`${what}: not within ${ceilingMilliseconds / 1000} s`);
    await new Promise((resolve) => setTimeout(resolve, 25));
  }
}

const folder = () => {
  const open = vscode.workspace.workspaceFolders?.[0];
  ok(open, 'a folder is open');
  return open.uri;
};
export const uriOf = (path: string) => vscode.Uri.joinPath(folder(), ...path.split('/'));

/** Opens a file of the copied examples in an editor. */
export async function open(path: string): Promise<vscode.TextEditor> {
  return vscode.window.showTextDocument(await vscode.workspace.openTextDocument(uriOf(path)), { preview: false });
}

/** Our findings of a file. */
export const findingsOf = (uri: vscode.Uri) =>
  vscode.languages.getDiagnostics(uri).filter(({ source }) => source === 'lanewright');
export const ruleOf = ({ code }: vscode.Diagnostic) => String(typeof code === 'object' ? code.value : code);
export const finding = (uri: vscode.Uri, rule: string) =>
  findingsOf(uri).find((diagnostic) => ruleOf(diagnostic) === rule);

/** Where a text stands in a document. */
export function rangeOfText(document: vscode.TextDocument, text: string): vscode.Range {
  const start = document.getText().indexOf(text);
  ok(start >= 0, `the document holds ${JSON.stringify(text)}, got ${JSON.stringify(document.getText())}`);
  return new vscode.Range(document.positionAt(start), document.positionAt(start + text.length));
}

export async function replace(editor: vscode.TextEditor, from: string, to: string): Promise<void> {
  const range = rangeOfText(editor.document, from);
  ok(await editor.edit((edit) => edit.replace(range, to)), 'the edit was taken');
}

/** Throws away what was typed into the files that are open: each gets the text that stands on disk. */
export async function revert(): Promise<void> {
  for (const document of vscode.workspace.textDocuments.filter(({ isDirty, isUntitled }) => isDirty && !isUntitled)) {
    const onDisk = new TextDecoder().decode(await vscode.workspace.fs.readFile(document.uri));
    const edit = new vscode.WorkspaceEdit();
    edit.replace(document.uri, new vscode.Range(0, 0, document.lineCount, 0), onDisk);
    ok(await vscode.workspace.applyEdit(edit), 'the text of the disk was taken');
    await document.save();
  }
}
