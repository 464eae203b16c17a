import { show } from '../../../src-core/quantity/show';
import { inertJson, relativeUri, visible } from './escape';
import { levelOf, ruleDescriptors, ruleIndex } from './sarif-rules';
import { fingerprints, type ToldFile, type ToldFinding, toldFile, wanted, worstFirst } from './told';
import type { MakePrinter } from './types';

type Range = ToldFinding['location']['range'];

/** More in one run and a forge refuses the whole file. */
const MOST_RESULTS = 25_000;

/** In a message brackets make links (SARIF 2.1.0, 3.11.6) and `{0}` takes an argument (3.11.5): neither comes from a file. */
const message = (text: string) => ({
  text: visible(text)
    .replace(/[\\[\]]/g, '\\$&')
    .replace(/\{(\d+)\}/g, '{{$1}}'),
});

const artifact = (file: string) => ({ uri: relativeUri(file), uriBaseId: '%SRCROOT%' });

const region = ({ start, end }: Range) => ({
  startLine: start.line,
  startColumn: start.column,
  endLine: end.line,
  endColumn: end.column,
});

const physical = ({ file, range }: ToldFinding['location']) => ({
  physicalLocation: { artifactLocation: artifact(file), region: region(range) },
});

function fix({ title, edits }: ToldFinding['fixes'][number]) {
  const files = [...new Set(edits.map(({ file }) => file))];
  return {
    description: message(title),
    artifactChanges: files.map((file) => ({
      artifactLocation: artifact(file),
      replacements: edits
        .filter((edit) => edit.file === file)
        .map(({ range, text }) => ({ deletedRegion: region(range), insertedContent: { text } })),
    })),
  };
}

const suppression = ({ reason, by, until, location }: NonNullable<ToldFinding['waiver']>) => ({
  kind: 'inSource',
  status: 'accepted',
  justification: visible(`${reason} (${by}, until ${until})`),
  location: physical(location),
});

/** In a review: found by it, there before, gone since. */
export type BaselineState = 'new' | 'unchanged' | 'absent';

/** One finding as a result. */
function sarifResult(finding: ToldFinding, fingerprint: string, baselineState?: BaselineState) {
  const { rule, severity, subject, location, related, waived, waiver } = finding;
  const fixes = finding.fixes.filter(({ edits }) => edits.length > 0);
  return {
    ruleId: rule,
    ruleIndex: ruleIndex(rule),
    level: levelOf[severity],
    ...(baselineState && { baselineState }),
    message: message(finding.message),
    locations: [
      {
        ...physical(location),
        ...(subject !== undefined && { logicalLocations: [{ name: visible(subject) }] }),
      },
    ],
    ...(related.length > 0 && {
      relatedLocations: related.map((one, id) => ({ id, ...physical(one.location), message: message(one.message) })),
    }),
    partialFingerprints: { 'lanewrightFinding/v1': fingerprint },
    ...(fixes.length > 0 && { fixes: fixes.map(fix) }),
    // an empty list says that nothing is suppressed: a reader then counts every other result
    suppressions: waived ? [waiver ? suppression(waiver) : { kind: 'inSource', status: 'accepted' }] : [],
  };
}

/** The log: one run, every rule, the results in the order in which they came. */
const sarifLog = (results: readonly unknown[], version: string, complete: boolean, notes: readonly string[]) => ({
  $schema: 'https://json.schemastore.org/sarif-2.1.0.json',
  version: '2.1.0',
  runs: [
    {
      tool: {
        driver: { name: 'Lanewright', version, semanticVersion: version, rules: ruleDescriptors },
      },
      automationDetails: { id: 'lanewright/' },
      columnKind: 'utf16CodeUnits',
      originalUriBaseIds: { '%SRCROOT%': { description: { text: 'The root of the work tree.' } } },
      invocations: [
        {
          executionSuccessful: complete,
          ...(notes.length > 0 && {
            toolExecutionNotifications: notes.map((text) => ({ level: 'note', message: message(text) })),
          }),
        },
      ],
      results,
    },
  ],
});

/** Takes findings as they come and gives the whole document, within what a forge takes of one upload. */
export function sarifDocument(version: string) {
  const fingerprintOf = fingerprints();
  const told: { severity: ToldFinding['severity']; result: unknown }[] = [];
  let complete = true;
  return {
    add(file: ToldFile, stateOf: (finding: ToldFinding) => BaselineState | undefined = () => undefined) {
      complete &&= !file.timedOut;
      for (const finding of file.findings) {
        const result = sarifResult(finding, fingerprintOf(finding), stateOf(finding));
        told.push({ severity: finding.severity, result });
      }
    },
    text() {
      const shown = new Set(worstFirst(told).slice(0, MOST_RESULTS));
      const left = told.length - shown.size;
      const notes = left > 0 ? [`${show.count(left, 'finding')} beyond the worst ${MOST_RESULTS} left out.`] : [];
      const results = told.filter((one) => shown.has(one)).map(({ result }) => result);
      return `${inertJson(sarifLog(results, version, complete, notes))}\n`;
    },
  };
}

/** SARIF 2.1.0. */
export const sarif: MakePrinter = ({ write, version, quiet }) => {
  const document = sarifDocument(version);
  return {
    file(analysis) {
      const file = toldFile(analysis);
      document.add({ ...file, findings: wanted(file.findings, quiet) });
    },
    end: () => write(document.text()),
  };
};
