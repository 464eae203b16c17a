import * as vscode from 'vscode';
import { equal, finding, findingsOf, ok, open, rangeOfText, replace, revert, until, uriOf } from './harness';

async function actions(document: vscode.TextDocument, range: vscode.Range): Promise<vscode.CodeAction[]> {
  return vscode.commands.executeCommand<vscode.CodeAction[]>(
    'vscode.executeCodeActionProvider',
    document.uri,
    range,
    undefined,
    20,
  );
}

export function defineEditingTests(): void {
  describe('fixes and edits', () => {
    it('the backdrill fix ends the stub’s finding', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      const stub = await until('the stub', () => finding(document.uri, 'stub-resonance'));
      const fix = (await actions(document, stub.range)).find(
        ({ title }) => /drill/i.test(title) && !/accept/i.test(title),
      );
      ok(fix?.edit, `a fix with an edit, got ${(await actions(document, stub.range)).map(({ title }) => title)}`);
      ok(/GHz/.test(fix.title), `the title says what is gained, got ${fix.title}`);
      await vscode.workspace.applyEdit(fix.edit);
      await until('no stub', () => !finding(document.uri, 'stub-resonance'));
      await revert();
    });

    it('a missing unit is offered as a fix, and a finding may be accepted', async () => {
      const editor = await open('lanes/ejector.channel.yaml');
      await replace(editor, 'length: 64 mm', 'length: 64');
      const bare = await until('the bare number', () => findingsOf(editor.document.uri)[0]);
      const titles = (await actions(editor.document, bare.range)).map(({ title }) => title);
      ok(
        titles.some((title) => /64 mm/.test(title)),
        `a fix with mm, got ${titles}`,
      );
      await revert();
      const failing = await open('lanes/camera-sled.channel.yaml');
      const stub = await until('the stub', () => finding(failing.document.uri, 'stub-resonance'));
      const accept = (await actions(failing.document, stub.range)).map(({ title }) => title);
      ok(
        accept.some((title) => /accept/i.test(title)),
        `an action that accepts, got ${accept}`,
      );
    });

    it('renames an element with all that name it', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      await until('findings', () => finding(document.uri, 'stub-resonance'));
      const at = rangeOfText(document, 'twinax').start.translate(0, 2);
      const edit = await vscode.commands.executeCommand<vscode.WorkspaceEdit>(
        'vscode.executeDocumentRenameProvider',
        document.uri,
        at,
        'long-cable',
      );
      equal(
        edit.entries().map(([uri]) => uri.path.split('/').pop()),
        ['camera-sled.channel.yaml'],
        'files that change',
      );
    });

    it('renames a part in the parts file and in every channel', async () => {
      const { document } = await open('boards/controller.parts.yaml');
      const at = rangeOfText(document, 'mezz-row-c').start.translate(0, 2);
      const edit = await vscode.commands.executeCommand<vscode.WorkspaceEdit>(
        'vscode.executeDocumentRenameProvider',
        document.uri,
        at,
        'mezz-row-d',
      );
      const files = edit
        .entries()
        .map(([uri]) => uri.path.split('/').pop())
        .sort();
      equal(files, ['camera-sled.channel.yaml', 'controller.parts.yaml'], 'files that change');
    });

    it('keeps the hints of untouched elements in a half-typed file', async () => {
      const editor = await open('lanes/ejector.channel.yaml');
      await replace(editor, '  - capacitor: coupling\n', '  - tr\n  - capacitor: coupling\n');
      await until('one finding', () => findingsOf(editor.document.uri).length > 0);
      const hints = await vscode.commands.executeCommand<vscode.InlayHint[]>(
        'vscode.executeInlayHintProvider',
        editor.document.uri,
        new vscode.Range(0, 0, editor.document.lineCount, 0),
      );
      ok(hints.length >= 2, `hints of the other elements, got ${hints.length}`);
      await revert();
    });

    it('is formatted without losing a comment', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      const edits =
        (await vscode.commands.executeCommand<vscode.TextEdit[]>('vscode.executeFormatDocumentProvider', document.uri, {
          tabSize: 2,
          insertSpaces: true,
        })) ?? [];
      const removed = edits.map(({ range }) => document.getText(range)).join('');
      ok(!removed.includes('#') || edits.some(({ newText }) => newText.includes('#')), 'comments are kept');
      ok(uriOf('lanes/camera-sled.channel.yaml').path === document.uri.path, 'the same file');
    });
  });
}
