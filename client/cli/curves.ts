import { analyse } from '../../src-core/analyse';
import type { Analysis } from '../../src-core/analysis';
import { type Curves, curvesOf } from '../../src-core/cascade/curves';
import { writeTouchstone } from '../../src-core/networks/touchstone-write';
import { readQuantity } from '../../src-core/quantity/read';
import { type Command, type OptionValues, Refusal } from './command';
import { openWorkspace } from './files';
import { inputsFor } from './inputs';
import { writeAtomically } from './write';

export const curves: Command = {
  name: 'curves',
  summary: 'The numbers behind the plots: scattering data against frequency.',
  arguments: 'FILE',
  options: [
    {
      name: 'format',
      short: 'f',
      value: 'FORMAT',
      choices: ['csv', 'touchstone', 'json'],
      help: 'How to print. Default: csv.',
    },
    {
      name: 'between',
      value: 'A,B',
      help: 'From the input of element A to the output of element B. Default: all of path.',
    },
    { name: 'elements', help: 'Each element for itself.' },
    { name: 'from', value: 'FREQUENCY', help: 'First frequency, such as 10MHz. Default: the grid of the analysis.' },
    { name: 'to', value: 'FREQUENCY', help: 'Last frequency.' },
    { name: 'points', value: 'N', help: 'How many, evenly spaced. Default: 1001.' },
    { name: 'output', short: 'o', value: 'FILE', help: 'Where to write. Default: standard output.' },
  ],
  examples: [
    ['lanewright curves lanes/rx0.channel.yaml', 'loss and reflection of the whole path on its own grid'],
    [
      'lanewright curves lanes/rx0.channel.yaml --between dive,rise --from 10MHz --to 60GHz',
      'a piece of it, at frequencies of your own',
    ],
  ],
  async run({ paths, options, terminal }) {
    if (paths.length !== 1) throw new Refusal('`lanewright curves` takes one channel file.');
    const workspace = openWorkspace(options);
    const analysis = analyse(await inputsFor(workspace, workspace.toFilePath(paths[0]), options), undefined, {
      until: 'time',
    });
    if (!analysis.networks)
      throw new Refusal(
        `\`${paths[0]}\` is not computed: ${analysis.verdict.text}. See \`lanewright check ${paths[0]}\`.`,
      );
    const found = curvesOf(analysis, {
      between: betweenOf(analysis, options.between),
      elements: options.elements === true,
      frequencies: frequenciesOf(options),
    });
    const text = printed(found, analysis, typeof options.format === 'string' ? options.format : 'csv');
    if (typeof options.output === 'string') await writeAtomically(options.output, text);
    else terminal.out(text);
    return 0;
  },
};

function betweenOf({ model }: Analysis, option: OptionValues[string]): readonly [number, number] | undefined {
  if (typeof option !== 'string') return undefined;
  const ends = option.split(',').map((name) => {
    const element = model.elements.find((candidate) => candidate.name === name.trim());
    if (!element)
      throw new Refusal(
        `\`${name}\` is not an element of this channel: ${model.elements.map((candidate) => candidate.name).join(', ')}.`,
      );
    return element.index;
  });
  if (ends.length !== 2) throw new Refusal('`--between` takes two names: `--between A,B`.');
  if (ends[0] > ends[1])
    throw new Refusal(`\`--between ${option}\` runs against the path; write the one nearer to the transmitter first.`);
  return [ends[0], ends[1]];
}

function frequenciesOf({ from, to, points }: OptionValues): Float64Array | undefined {
  if (from === undefined && to === undefined && points === undefined) return undefined;
  if (typeof from !== 'string' || typeof to !== 'string')
    throw new Refusal('`--from` and `--to` go together: `--from 10MHz --to 60GHz`.');
  const [first, last] = [frequencyOf('from', from), frequencyOf('to', to)];
  const count = points === undefined ? 1001 : Number(points);
  if (!Number.isInteger(count) || count < 1 || count > 100_000)
    throw new Refusal(`\`--points ${points}\` is not a whole number from 1 to 100000.`);
  if (last < first || (count > 1 && last === first)) throw new Refusal('`--to` must be above `--from`.');
  return Float64Array.from({ length: count }, (_, i) =>
    count === 1 ? first : first + ((last - first) * i) / (count - 1),
  );
}

function frequencyOf(name: string, text: string): number {
  if (text === '0') return 0;
  const { quantity, problem } = readQuantity(text, { dimensions: ['frequency'], at: 'never', tolerance: false });
  if (!quantity || quantity.value < 0)
    throw new Refusal(`\`--${name} ${text}\`: ${problem?.message ?? 'a frequency is wanted'}`);
  return quantity.value;
}

function printed(
  { frequencies, parts, singleEnded, referenceOhms }: Curves,
  { model }: Analysis,
  format: string,
): string {
  if (format === 'json') {
    return `${JSON.stringify({ version: 1, file: model.file, singleEnded, referenceOhms, frequenciesHz: [...frequencies], parts: parts.map(({ name, columns }) => ({ name, columns: Object.fromEntries(columns.map((column) => [column.name, [...column.values]])) })) })}\n`;
  }
  if (format === 'touchstone') {
    if (parts.length > 1)
      throw new Refusal('One Touchstone file holds one network: use `--between` in place of `--elements`.');
    return writeTouchstone(parts[0].network, {
      frequencies,
      referenceOhms,
      singleEnded,
      comment: `${model.file}, ${parts[0].name}`,
    });
  }
  const columns = parts.flatMap(({ name, columns: own }) =>
    own.map((column) => ({ ...column, name: parts.length > 1 ? `${name} ${column.name}` : column.name })),
  );
  const rows = [['frequency_Hz', ...columns.map(({ name }) => name.replace(/[",\n\r]/g, ' '))].join(',')];
  for (let i = 0; i < frequencies.length; i++)
    rows.push([frequencies[i], ...columns.map(({ values }) => values[i])].join(','));
  return `${rows.join('\n')}\n`;
}
