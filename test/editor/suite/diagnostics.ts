import * as vscode from 'vscode';
import { equal, finding, findingsOf, ok, open, replace, revert, ruleOf, until, uriOf } from './harness';

export function defineDiagnosticsTests(): void {
  describe('findings', () => {
    it('name the failing stub on its line, with a link to the rule', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      const stub = await until('the stub', () => finding(document.uri, 'stub-resonance'));
      ok(
        document.lineAt(stub.range.start.line).text.includes('dive') || stub.message.includes('dive'),
        'the via is named',
      );
      ok(
        typeof stub.code === 'object' && String(stub.code.target).includes('stub-resonance'),
        'the code links to the rule’s paragraph',
      );
    });

    it('are none for a good channel', async () => {
      const { document } = await open('lanes/ejector.channel.yaml');
      await until(
        'a lens, so that the file was analysed',
        async () =>
          (await vscode.commands.executeCommand<vscode.CodeLens[]>('vscode.executeCodeLensProvider', document.uri, 1))
            .length > 0,
      );
      equal(findingsOf(document.uri).map(ruleOf), [], 'findings of the good lane');
    });

    it('follow the text while one types, and go with the fault', async () => {
      const editor = await open('lanes/ejector.channel.yaml');
      await replace(editor, 'length: 64 mm', 'lenght: 64 mm');
      const misspelt = await until('the misspelling', () =>
        findingsOf(editor.document.uri).find(({ message }) => message.includes('did you mean `length`')),
      );
      equal(editor.document.getText(misspelt.range).includes('lenght'), true, 'range of the misspelling');
      await replace(editor, 'lenght: 64 mm', 'length: 64 mm');
      await until('no finding', () => findingsOf(editor.document.uri).length === 0);
      await revert();
    });

    it('are renewed in every channel that uses a parts file, unsaved too', async () => {
      const channel = await open('lanes/ejector.channel.yaml');
      const parts = await open('boards/controller.parts.yaml');
      await replace(parts, '  fast:\n', '  quick:\n');
      await until('the unknown stackup', () =>
        findingsOf(channel.document.uri).find(({ message }) => message.includes('ctrl.fast')),
      );
      await revert();
      await until('no finding', () => findingsOf(channel.document.uri).length === 0);
    });

    it('come once: pulled, not pushed as well', async () => {
      await open('lanes/camera-sled.channel.yaml');
      const uri = uriOf('lanes/camera-sled.channel.yaml');
      await until('the stub', () => finding(uri, 'stub-resonance'));
      equal(
        findingsOf(uri).filter((diagnostic) => ruleOf(diagnostic) === 'stub-resonance').length,
        1,
        'findings of the stub',
      );
    });
  });
}
