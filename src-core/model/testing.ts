import { rangeOf } from '../text/range';
import { channelText, exampleModel, exampleTexts, partsText } from './fixtures';

/** Each finding of text and model as `rule at «marked text»`, the analysed file's first, in the order of the text. */
export function findingsOf(texts: Readonly<Record<string, string>>): string[] {
  return reportsIn(texts).map(({ rule, marked }) => `${rule} «${marked}»`);
}

export function reportsIn(texts: Readonly<Record<string, string>>) {
  const { parsed, model } = exampleModel(texts);
  const reports = [...[...parsed.values()].flatMap((one) => one.reports), ...model.reports];
  return reports.map((report) => {
    const file = parsed.get(report.at.file)!;
    const range = report.range ?? rangeOf(file, report.at);
    return { ...report, range, marked: file.text.slice(range.start, range.end) };
  });
}

/** The example with `path` replaced; what refers to its elements goes too. */
export function withPath(path: string, { head = '', parts = partsText }: { head?: string; parts?: string } = {}) {
  const top = channelText.slice(0, channelText.indexOf('path:'));
  return exampleTexts({ channel: `${top}${head}path:\n${path}`, parts });
}

/** The example's text with one piece replaced. */
export function changed(from: string, to: string, text = channelText): string {
  if (!text.includes(from)) throw new Error(`not in the example: ${from}`);
  return text.replace(from, to);
}
