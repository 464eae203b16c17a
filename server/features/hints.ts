import { type InlayHint, InlayHintKind, type InlayHintParams, MarkupKind } from 'vscode-languageserver';
import { describeElement } from '../../src-core/assist/describe-element';
import { type Hint, hintsOf } from '../../src-core/assist/hints';
import { rangeOf } from '../../src-core/text/index';
import { fromRange, positionAt, toRange, toTextEdit } from '../convert';
import { type Analysed, type Handler, located } from '../handler';
import type { Services } from '../services';
import type { Settings } from '../settings';

/** Figures beside the elements, for the part of the text that is seen. */
export const inlayHints: Handler<InlayHintParams, InlayHint[] | null> =
  (services) =>
  async ({ textDocument, range }, token) => {
    const settings = await services.settings.of(textDocument.uri);
    const at = await located(services, textDocument.uri, token);
    if (!at) return null;
    return hintsOf(at.analysis, at.file, fromRange(at.text, range))
      .filter(({ kind }) => isWanted(settings, kind))
      .map((hint, i, all) => toInlayHint(services, at, textDocument.uri, hint, all[i - 1]?.offset === hint.offset));
  };

const isWanted = ({ hints }: Settings, kind: Hint['kind']) => hints[kind];

interface HintData {
  readonly uri: string;
  readonly element?: string;
}

function toInlayHint(
  services: Services,
  { analysis, root, text }: Analysed,
  uri: string,
  { offset, label, kind, target, insert, element }: Hint,
  follows: boolean,
): InlayHint {
  const targetText = target && analysis.parsed.get(target.file);
  const location = target &&
    targetText && {
      uri: services.documents.uriOf({ root, file: target.file }),
      range: toRange(targetText.text, rangeOf(targetText, target)),
    };
  return {
    position: positionAt(text, offset),
    // Hints at one spot read as one phrase: editors set them without a gap.
    label: [...(follows ? [{ value: ', ' }] : []), { value: label, ...(location && { location }) }],
    ...(!follows && { paddingLeft: true }),
    ...(kind === 'derived' && { kind: InlayHintKind.Parameter }),
    ...(insert && { textEdits: [toTextEdit(text, insert)] }),
    data: { uri, ...(element !== undefined && { element }) } satisfies HintData,
  };
}

/** The explanation of a hint, made when the pointer rests on it. */
export const resolveHint: Handler<InlayHint, InlayHint> = (services) => async (hint, token) => {
  const { uri, element } = (hint.data ?? {}) as Partial<HintData>;
  const at = uri === undefined ? undefined : await located(services, uri, token);
  const found = element === undefined ? undefined : at?.analysis.model.elements.find(({ name }) => name === element);
  return found
    ? { ...hint, tooltip: { kind: MarkupKind.Markdown, value: describeElement(at!.analysis, found) } }
    : hint;
};
