import type { Quantity } from '../../schemas/format/types';
import type { Analysis } from '../analysis';
import { figureKinds } from '../figures/list';
import type { KeyInfo } from '../format/index';
import type { AnyElement } from '../model/types';
import { readQuantity } from '../quantity/read';
import { show } from '../quantity/show';
import type { FilePath, TextRange } from '../text/types';
import { conversionsOf } from './conversions';
import { describeElement } from './describe-element';
import { keyRows } from './describe-key';
import { describeName } from './describe-name';
import { growthOf } from './growth';
import { page, plainText, type Row } from './markdown';
import { type Subject, subjectAt } from './subject';

export interface Description {
  readonly range: TextRange;
  readonly markdown: string;
}

/**
 * What stands at an offset and what it means for this channel: Markdown of at most twelve lines, no HTML, nothing from the
 * file that could act. Undefined where there is nothing to say.
 */
export function describeAt(analysis: Analysis, file: FilePath, offset: number): Description | undefined {
  const parsed = analysis.parsed.get(file);
  const subject = parsed && subjectAt(parsed, offset);
  if (!subject) return undefined;
  const markdown = describe(analysis, file, subject, offset);
  return markdown === undefined ? undefined : { range: subject.range, markdown };
}

function describe(analysis: Analysis, file: FilePath, subject: Subject, offset: number): string | undefined {
  const { path, kind, key } = subject;
  const element =
    file === analysis.model.file && path[0] === 'path'
      ? analysis.model.elements.find(({ index }) => index === path[1])
      : undefined;
  if (element && path.length === 3 && path[2] === element.kind) return describeElement(analysis, element);
  const limit =
    path[0] === 'limits' && path.length === 3 && path[2] === kind
      ? describeLimit(analysis, file, Number(path[1]))
      : undefined;
  if (limit) return limit;
  if (subject.on === 'value') {
    const quantity =
      key?.quantity && !key.quantity.band ? readQuantity(subject.text, key.quantity).quantity : undefined;
    if (quantity && key) return describeQuantity(analysis, key, quantity, element);
    const name = describeName(analysis, file, offset);
    if (name) return name;
  }
  return (
    key && describeKey(analysis, key, element, path.length === 1 && path[0] === 'path' && file === analysis.model.file)
  );
}

function describeKey(analysis: Analysis, key: KeyInfo, element: AnyElement | undefined, isPath: boolean): string {
  const rows: Row[] = [...keyRows(key)];
  const written = element && (element.values as Record<string, unknown>)[key.key];
  if (isPath)
    rows.push(
      ...analysis.figures
        .slice(0, 6)
        .map(({ name, title, text }): Row => [title, isOld(analysis, name) ? `~ ${text}` : text]),
    );
  else if (isQuantity(written)) rows.push(['Here', show.quantity(written)]);
  const growth = element && key.key === 'length' ? (growthOf(analysis, element) ?? '') : '';
  return page(`**${plainText(key.key)}**: ${plainText(key.description)}`, rows, [growth]);
}

function describeQuantity(
  analysis: Analysis,
  key: KeyInfo,
  quantity: Quantity,
  element: AnyElement | undefined,
): string {
  const rows: Row[] = [...conversionsOf(quantity, analysis.model)];
  const row = element && analysis.ledger?.rows.find(({ index }) => index === element.index);
  const figure = (name: string) => row?.figures.find((one) => one.name === name)?.text;
  if (key.key === 'length' && row) {
    const [loss, delay] = [figure('own-loss-at-nyquist'), figure('delay')];
    if (loss !== undefined) rows.push(['Loss at Nyquist', loss]);
    if (delay !== undefined) rows.push(['Delay', delay]);
  }
  if (key.key === 'budget' && row?.budget)
    rows.push(['Spent', `${row.budget.text}, ${show.percent(row.budget.share)}`]);
  const growth = element && key.key === 'length' ? (growthOf(analysis, element) ?? '') : '';
  return page(`**${plainText(key.key)}** ${show.quantity(quantity)}: ${plainText(key.description)}`, rows, [growth]);
}

function describeLimit(analysis: Analysis, file: FilePath, index: number): string | undefined {
  const limit = file === analysis.model.file ? analysis.model.limits.find((one) => one.index === index) : undefined;
  if (!limit) return undefined;
  const outcome = analysis.limits.find(({ name }) => name === limit.name);
  if (!outcome) return page(`**${plainText(limit.name)}**: ${limit.kind}`, [], ['Not judged yet.']);
  const rows: Row[] = [
    ['Allowed', outcome.limit.text],
    ['Here', outcome.kind === 'eye' && analysis.linkIsStale ? `~ ${outcome.actual.text}` : outcome.actual.text],
    ['In hand', show.percent(outcome.marginShare)],
  ];
  return page(`**${plainText(limit.name)}**: ${limit.kind}, ${outcome.met ? 'met' : 'missed'}`, rows, [
    plainText(outcome.text),
  ]);
}

/** Of the eye, while that belongs to an older text. */
const isOld = ({ linkIsStale }: Analysis, figure: string) =>
  linkIsStale && figureKinds.some(({ name, ofLink }) => name === figure && ofLink);

const isQuantity = (value: unknown): value is Quantity =>
  typeof value === 'object' && value !== null && 'dimension' in value && 'value' in value;
