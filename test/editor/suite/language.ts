import * as vscode from 'vscode';
import { equal, finding, ok, open, rangeOfText, until, uriOf } from './harness';

export function defineLanguageTests(): void {
  describe('a channel file in the editor', () => {
    it('has its own language, so that no other YAML extension doubles its findings', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      equal(document.languageId, 'lanewright-channel', 'language of a channel');
      equal(
        (await vscode.workspace.openTextDocument(uriOf('boards/sled.parts.yaml'))).languageId,
        'lanewright-parts',
        'language of a parts file',
      );
      equal(
        (await vscode.workspace.openTextDocument(uriOf('lanewright.config.yaml'))).languageId,
        'lanewright-config',
        'language of a config file',
      );
    });

    it('shows what an element is and spends', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      await until('findings', () => finding(document.uri, 'stub-resonance'));
      const at = rangeOfText(document, '- via: dive').start.translate(0, 9);
      const hovers = await vscode.commands.executeCommand<vscode.Hover[]>(
        'vscode.executeHoverProvider',
        document.uri,
        at,
      );
      const words = hovers
        .flatMap(({ contents }) => contents.map((part) => (typeof part === 'string' ? part : part.value)))
        .join('\n');
      ok(
        /dive/.test(words) && /dB/.test(words) && /GHz/.test(words),
        `a via's hover names loss and resonance, got ${JSON.stringify(words)}`,
      );
    });

    it('shows loss and stub beside the text', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      const whole = new vscode.Range(0, 0, document.lineCount, 0);
      const hints = await until('hints', async () => {
        const found = await vscode.commands.executeCommand<vscode.InlayHint[]>(
          'vscode.executeInlayHintProvider',
          document.uri,
          whole,
        );
        return found.length > 3 && found;
      });
      const labels = hints.map(({ label }) =>
        typeof label === 'string' ? label : label.map(({ value }) => value).join(''),
      );
      ok(
        labels.some((label) => /dB/.test(label)),
        `a hint in dB, got ${labels}`,
      );
      ok(
        labels.some((label) => /stub .* GHz/.test(label)),
        `a hint of the stub, got ${labels}`,
      );
    });

    it('has the verdict above the path', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      const lenses = await until('a lens', async () => {
        const found = await vscode.commands.executeCommand<vscode.CodeLens[]>(
          'vscode.executeCodeLensProvider',
          document.uri,
          5,
        );
        return found.length > 0 && found;
      });
      equal(lenses[0].range.start.line, rangeOfText(document, 'path:').start.line, 'line of the lens');
      ok(
        /\d (?:dB|mV)/.test(lenses[0].command?.title ?? ''),
        `the lens tells a figure, got ${lenses[0].command?.title}`,
      );
    });

    it('offers the keys of the kind one is in', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      const at = rangeOfText(document, '    length: 12 mm').start.translate(0, 4);
      const { items } = await vscode.commands.executeCommand<vscode.CompletionList>(
        'vscode.executeCompletionItemProvider',
        document.uri,
        at,
      );
      const labels = items.map(({ label }) => (typeof label === 'string' ? label : label.label));
      ok(labels.includes('skew'), `a trace's keys, got ${labels.slice(0, 30)}`);
      ok(!labels.includes('drill'), 'a via’s keys are not offered in a trace');
    });

    it('jumps from a part to the parts file that holds it', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      const at = rangeOfText(document, 'ctrl.mezz-row-c').start.translate(0, 7);
      const found = await vscode.commands.executeCommand<(vscode.Location | vscode.LocationLink)[]>(
        'vscode.executeDefinitionProvider',
        document.uri,
        at,
      );
      const target = found.map((place) => ('targetUri' in place ? place.targetUri : place.uri).path);
      ok(target[0]?.endsWith('/boards/controller.parts.yaml'), `the parts file, got ${target}`);
    });

    it('has an outline of its elements', async () => {
      const { document } = await open('lanes/camera-sled.channel.yaml');
      const symbols = await vscode.commands.executeCommand<vscode.DocumentSymbol[]>(
        'vscode.executeDocumentSymbolProvider',
        document.uri,
      );
      const names = JSON.stringify(symbols.map(({ name, children }) => [name, children.map((child) => child.name)]));
      ok(names.includes('main-run') && names.includes('ball-to-ball'), `elements and limits, got ${names}`);
    });
  });
}
