import type { Analysis } from '../analysis';
import type { AnyElement } from '../model/types';
import { show } from '../quantity/show';
import { code, page, plainText, type Row } from './markdown';

/** An element: what it is, what it spends here, how much of what may be lost is used so far. */
export function describeElement(analysis: Analysis, element: AnyElement): string {
  const row = analysis.ledger?.rows.find(({ index }) => index === element.index);
  const network = analysis.networks?.elements[element.index];
  const facts = network?.prepared?.facts;
  const figures: Row[] = (row?.figures ?? []).map(({ title, text, note }) => [
    title,
    note ? `${text} (${note})` : text,
  ]);
  const stubs: Row[] = (facts?.stubs ?? [])
    .filter(({ lengthMeters }) => lengthMeters > 0)
    .map((stub) => [
      `Stub, ${stub.side}`,
      `${show.length(stub.lengthMeters)}${Number.isFinite(stub.notchHz) ? `, notch at ${show.frequency(stub.notchHz)}` : ''}`,
    ]);
  const rows: Row[] = [...figures, ...stubs.filter(() => figures.length < 7)];
  if (row) {
    const share = row.cumulativeShare === undefined ? '' : `, ${show.percent(row.cumulativeShare)} of what may be lost`;
    rows.push(['So far along the path', `${show.loss(row.cumulativeDb)}${share}`]);
    if (row.budget) rows.push(['Budget', `${row.budget.text}, ${show.percent(row.budget.share)}`]);
  }
  return page(heading(element, facts?.construction), rows, [remark(analysis, element)]);
}

function heading({ kind, name, layer, from, to, stackup }: AnyElement, construction: string | undefined): string {
  const where = layer ? `on ${code(layer)}` : from && to ? `from ${code(from)} to ${code(to)}` : '';
  const what = [kind, where, stackup && (layer || from) ? `of ${code(stackup.name)}` : ''].filter(Boolean).join(' ');
  return `**${plainText(name)}**: ${what}${construction ? `, ${plainText(construction)}` : ''}`;
}

function remark(analysis: Analysis, element: AnyElement): string {
  if (element.incomplete) return 'Not computed: something is missing. The figures of the channel are without it.';
  if (element.includedIn !== undefined)
    return `Held by the file of ${code(element.includedIn)}: counted there, a straight through here.`;
  if (!analysis.networks) return 'Nothing is computed yet.';
  const { note } = element.values as { note?: unknown };
  return typeof note === 'string' ? plainText(note.slice(0, 300)) : '';
}
