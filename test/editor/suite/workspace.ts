import * as vscode from 'vscode';
import { equal, finding, findingsOf, ok, open, replace, revert, ruleOf, until, uriOf } from './harness';

const EJECTOR = 'lanes/ejector.channel.yaml';
const SLED = 'lanes/camera-sled.channel.yaml';
const textOf = async (path: string) => new TextDecoder().decode(await vscode.workspace.fs.readFile(uriOf(path)));
const write = (path: string, text: string) =>
  vscode.workspace.fs.writeFile(uriOf(path), new TextEncoder().encode(text));
const closeEditors = () => vscode.commands.executeCommand('workbench.action.closeAllEditors');
const lenses = (uri: vscode.Uri) =>
  vscode.commands.executeCommand<vscode.CodeLens[]>('vscode.executeCodeLensProvider', uri, 5);
const hintLabels = async (document: vscode.TextDocument) => {
  const whole = new vscode.Range(0, 0, document.lineCount, 0);
  const hints = await vscode.commands.executeCommand<vscode.InlayHint[]>(
    'vscode.executeInlayHintProvider',
    document.uri,
    whole,
  );
  return hints.map(({ label }) => (typeof label === 'string' ? label : label.map(({ value }) => value).join('')));
};

export function defineWorkspaceTests(): void {
  describe('the workspace', () => {
    it('has findings of files that no editor shows', async () => {
      await open(EJECTOR);
      await until('findings of the backplane', () => findingsOf(uriOf('lanes/backplane.channel.yaml')).length > 0);
    });

    it('a file closed and opened at once goes on to be followed (client fault 1821)', async () => {
      for (let i = 0; i < 3; i++) {
        await open(EJECTOR);
        await closeEditors();
      }
      const editor = await open(EJECTOR);
      await replace(editor, 'length: 64 mm', 'lenght: 64 mm');
      await until('the misspelling', () => finding(editor.document.uri, 'schema'));
      await replace(editor, 'lenght: 64 mm', 'length: 64 mm');
      await until('no finding', () => findingsOf(editor.document.uri).length === 0);
    });

    it('a file made, changed and deleted outside an editor is followed (client fault 1647)', async () => {
      await open(EJECTOR);
      const path = 'lanes/made.channel.yaml';
      await write(path, (await textOf(SLED)).replace('max: 18 dB', 'max: 2 dB'));
      await until('the loss', () => finding(uriOf(path), 'insertion-loss'));
      await write(path, await textOf(EJECTOR));
      await until('no finding of the good text', () => findingsOf(uriOf(path)).length === 0);
      await write(path, await textOf(SLED));
      await until('the stub', () => finding(uriOf(path), 'stub-resonance'));
      await vscode.workspace.fs.delete(uriOf(path));
      await until('nothing of a file that is gone', () => findingsOf(uriOf(path)).length === 0);
    });

    it('a parts file that is renamed keeps its name in every channel', async () => {
      const { document } = await open(SLED);
      await until('the stub', () => finding(document.uri, 'stub-resonance'));
      const rename = async (from: string, to: string) => {
        const edit = new vscode.WorkspaceEdit();
        edit.renameFile(uriOf(from), uriOf(to));
        ok(await vscode.workspace.applyEdit(edit), `${from} was renamed`);
      };
      await rename('boards/sled.parts.yaml', 'boards/carriage.parts.yaml');
      await until('the new path', () => document.getText().includes('sled: ../boards/carriage.parts.yaml'));
      await vscode.workspace.saveAll(false);
      await until('the stub, its parts read from the renamed file', () => finding(document.uri, 'stub-resonance'));
      equal(
        findingsOf(document.uri)
          .map(ruleOf)
          .filter((rule) => rule !== 'stub-resonance' && rule !== 'eye'),
        [],
        'other findings',
      );
      await rename('boards/carriage.parts.yaml', 'boards/sled.parts.yaml');
      await until('the old path', () => document.getText().includes('sled: ../boards/sled.parts.yaml'));
      await vscode.workspace.saveAll(false);
    });

    it('follows its settings without a reload', async () => {
      const { document } = await open(SLED);
      await until('a lens', async () => (await lenses(document.uri)).length > 0);
      const settings = () => vscode.workspace.getConfiguration('lanewright', document.uri);
      const set = (name: string, value: unknown) =>
        settings().update(name, value, vscode.ConfigurationTarget.Workspace);
      await set('lens', false);
      await until('no lens', async () => (await lenses(document.uri)).length === 0);
      await set('lens', undefined);
      await until('the lens again', async () => (await lenses(document.uri)).length > 0);
      await set('hints.stub', false);
      await until('hints without stubs', async () => {
        const labels = await hintLabels(document);
        return labels.some((label) => label.includes('dB')) && !labels.some((label) => label.includes('stub'));
      });
      await set('hints.stub', undefined);
      await until('stubs again', async () => (await hintLabels(document)).some((label) => label.includes('stub')));
      await revert();
    });
  });
}
