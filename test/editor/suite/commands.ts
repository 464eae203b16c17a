import * as vscode from 'vscode';
import { equal, finding, findingsOf, ok, open, replace, until } from './harness';

const actionsOf = (document: vscode.TextDocument, range: vscode.Range, kind?: vscode.CodeActionKind) =>
  vscode.commands.executeCommand<vscode.CodeAction[]>(
    'vscode.executeCodeActionProvider',
    document.uri,
    range,
    kind?.value,
    20,
  );

/** Answers the editor's questions in turn, as a person would type; the answers replace what stands in the box. */
async function answering(answers: readonly (string | undefined)[], run: () => Promise<unknown>): Promise<string[]> {
  const box = vscode.window as { showInputBox: typeof vscode.window.showInputBox };
  const real = box.showInputBox;
  const asked: string[] = [];
  box.showInputBox = (async (options: vscode.InputBoxOptions) => {
    const answer = answers[asked.length] ?? options.value ?? '';
    asked.push(options.prompt ?? '');
    const problem = await options.validateInput?.(answer);
    ok(!problem, `${options.prompt}: ${JSON.stringify(problem)}`);
    return answer;
  }) as typeof real;
  try {
    await run();
  } finally {
    box.showInputBox = real;
  }
  return asked;
}

export function defineCommandTests(): void {
  describe('commands', () => {
    it('are all there, each either possible anywhere or with a condition', async () => {
      const { packageJSON } = vscode.extensions.getExtension('lanewright.lanewright')!;
      await open('lanes/camera-sled.channel.yaml');
      const known = await until('the commands', async () => {
        const all = await vscode.commands.getCommands(true);
        return all.includes('lanewright.openPreview') && all;
      });
      const declared = packageJSON.contributes.commands as { command: string; enablement?: string }[];
      equal(
        declared.filter(({ command }) => !known.includes(command)),
        [],
        'commands without a function',
      );
      const anywhere = declared.filter(({ enablement }) => !enablement).map(({ command }) => command.split('.')[1]);
      equal(
        anywhere.sort(),
        ['copyReport', 'newChannel', 'restartServer', 'showFormat', 'showOutput', 'showRules'],
        'commands without a condition',
      );
    });

    it('“accept this finding” writes a waiver with reason, name, day and value, and the finding is gone', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      const stub = await until('the stub', () => finding(document.uri, 'stub-resonance'));
      const accept = (await actionsOf(document, stub.range)).find(
        ({ title, command }) => command && /accept/i.test(title),
      );
      ok(accept?.command, 'the action that accepts');
      const asked = await answering(['the first lot is drilled by hand', 'signal team'], () =>
        Promise.resolve(vscode.commands.executeCommand(accept.command!.command, ...(accept.command!.arguments ?? []))),
      );
      ok(asked.length >= 3, `it asked why, who and until when, got ${asked}`);
      await until('no stub', () => !finding(document.uri, 'stub-resonance'));
      const text = document.getText();
      for (const line of [
        /waivers:/,
        /reason: the first lot is drilled by hand/,
        /by: signal team/,
        /until: \d{4}-\d{2}-\d{2}/,
      ])
        ok(line.test(text), `${line} in ${text.slice(-400)}`);
    });

    it('“fix all” takes the safe fixes and no others', async () => {
      const editor = await open('lanes/camera-sled.channel.yaml');
      await until('the stub', () => finding(editor.document.uri, 'stub-resonance'));
      await replace(editor, 'length: 12 mm', 'lenght: 12 mm');
      await until('the misspelling', () => finding(editor.document.uri, 'schema'));
      const whole = new vscode.Range(0, 0, editor.document.lineCount, 0);
      const [all] = await actionsOf(editor.document, whole, vscode.CodeActionKind.SourceFixAll.append('lanewright'));
      ok(all?.edit, 'the source action');
      ok(await vscode.workspace.applyEdit(all.edit), 'its edit was taken');
      await until('no misspelling', () => !finding(editor.document.uri, 'schema'));
      ok(editor.document.getText().includes('length: 12 mm'), 'the key is right');
      await until('the stub, which is physics', () => finding(editor.document.uri, 'stub-resonance'));
    });

    it('a new channel has no finding', async () => {
      await vscode.commands.executeCommand('lanewright.newChannel');
      const document = await until(
        'the new text',
        () => vscode.window.activeTextEditor?.document.isUntitled && vscode.window.activeTextEditor.document,
      );
      equal(document.languageId, 'lanewright-channel', 'its language');
      await until('its verdict', async () => {
        const [lens] = await vscode.commands.executeCommand<vscode.CodeLens[]>(
          'vscode.executeCodeLensProvider',
          document.uri,
          1,
        );
        return /meets|ok|within/i.test(lens?.command?.title ?? '') && !/not computed/.test(lens?.command?.title ?? '');
      });
      equal(
        findingsOf(document.uri).map(({ message }) => message),
        [],
        'findings',
      );
      await vscode.commands.executeCommand('workbench.action.revertAndCloseActiveEditor');
    });

    it('the report for an issue has versions and counts, and nothing of a file', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      await until('the stub', () => finding(document.uri, 'stub-resonance'));
      await vscode.commands.executeCommand('lanewright.copyReport');
      const report = await until('the report', async () => {
        const text = await vscode.env.clipboard.readText();
        return text.includes('"extension"') && text;
      });
      const { server, extension } = JSON.parse(report);
      ok(/^\d+\.\d+\.\d+/.test(extension) && server.openFiles >= 1, `version and counts, got ${report}`);
      for (const word of ['camera', 'sled', 'dive', 'twinax', document.uri.path])
        ok(!report.includes(word), `nothing of a file, but ${word} is in ${report}`);
    });
  });
}
