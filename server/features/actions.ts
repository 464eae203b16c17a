import { type CodeAction, CodeActionKind, type CodeActionParams, type Diagnostic } from 'vscode-languageserver';
import { type Action, actionsAt, editsOfFix, fixAllOf, placeKey } from '../../src-core/assist/actions';
import { acceptedText } from '../../src-core/rules/waivers';
import { fromRange } from '../convert';
import { toDiagnostic } from '../diagnostics';
import { type Analysed, type Handler, located } from '../handler';
import { type AcceptFinding, acceptFindingCommand } from '../protocol';
import { idOf } from '../roots';
import type { Services } from '../services';
import { workspaceEdit } from './rename';

export const FIX_ALL = `${CodeActionKind.SourceFixAll}.lanewright`;

interface ActionData {
  readonly uri: string;
  readonly rule: string;
  readonly title: string;
  readonly at: string;
}

/** What answers the findings here. Only listed: an edit is worked out when it is chosen. */
export const codeActions: Handler<CodeActionParams, CodeAction[] | null> =
  (services) =>
  async ({ textDocument, range, context }, token) => {
    const document = services.documents.get(textDocument.uri);
    if (document && services.skipped.has(idOf(document.located))) {
      const title = 'Analyse this file again';
      return [
        {
          title,
          kind: CodeActionKind.QuickFix,
          command: { title, command: 'lanewright.analyseAgain', arguments: [textDocument.uri] },
        },
      ];
    }
    const at = await located(services, textDocument.uri, token);
    if (!at) return null;
    const wanted = (kind: string) =>
      !context.only || context.only.some((only) => kind === only || kind.startsWith(`${only}.`));
    const actions: CodeAction[] = [];
    if (wanted(CodeActionKind.QuickFix)) {
      for (const action of actionsAt(at.analysis, at.file, fromRange(at.text, range))) {
        const isRefused = action.kind === 'accept' && action.refused !== undefined;
        if (!isRefused || services.client.disabledActions)
          actions.push(toCodeAction(services, at, textDocument.uri, action));
      }
    }
    if (context.only && wanted(FIX_ALL)) {
      const edits = fixAllOf(at.analysis, at.file);
      if (edits.length > 0)
        actions.push({
          title: 'Fix all that is safe',
          kind: FIX_ALL,
          edit: workspaceEdit(services, at.root, at.analysis.parsed, edits),
        });
    }
    return actions;
  };

function toCodeAction(
  services: Services,
  { analysis, root, file, text }: Analysed,
  uri: string,
  action: Action,
): CodeAction {
  const { finding, title } = action;
  const diagnostics: Diagnostic[] = [toDiagnostic(services, { root, file }, analysis, finding, text)];
  if (action.kind === 'fix') {
    const data: ActionData = { uri, rule: finding.rule, title, at: placeKey(finding) };
    return { title, kind: CodeActionKind.QuickFix, diagnostics, data, ...(action.preferred && { isPreferred: true }) };
  }
  const common = { title, kind: CodeActionKind.QuickFix, diagnostics };
  if (action.refused !== undefined) return { ...common, disabled: { reason: action.refused } };
  const { rule, subject, message } = finding;
  const value = acceptedText(finding);
  const argument: AcceptFinding = {
    uri,
    rule,
    at: subject ?? '',
    message: String(message),
    ...(value !== undefined && { value }),
  };
  return { ...common, command: { title, command: acceptFindingCommand, arguments: [argument] } };
}

export const resolveAction: Handler<CodeAction, CodeAction> = (services) => async (action, token) => {
  const { uri, rule, title, at: place } = (action.data ?? {}) as Partial<ActionData>;
  if (uri === undefined || rule === undefined || title === undefined || place === undefined) return action;
  const at = await located(services, uri, token);
  const edits = at ? editsOfFix(at.analysis, rule, title, place) : [];
  return at && edits.length > 0
    ? { ...action, edit: workspaceEdit(services, at.root, at.analysis.parsed, edits) }
    : action;
};
