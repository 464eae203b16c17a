import type { ElementKindName } from '../../schemas/format/types';
import { schemas } from '../../schemas/generated/format';
import type { FormatProblem } from './problem';
import { listed } from './say';

/** What an element lacks: any one of `anyOf` would do. */
export interface MissingKey {
  readonly anyOf: readonly string[];
  /** What the model cannot give without it: `impedance`, `delay`. */
  readonly for: string;
}

type Has = (key: string) => boolean;
const one = (key: string, purpose = key): MissingKey => ({ anyOf: [key], for: purpose });

/** Package and cable: declared impedance, delay and loss. */
function segment(has: Has): MissingKey[] {
  return [
    ...(has('length') ? [] : [one('length')]),
    ...(has('impedance') ? [] : [one('impedance')]),
    ...(hasDelay(has) ? [] : [{ anyOf: ['delay', 'velocity', 'dk'], for: 'delay' }]),
    ...(has('loss') ? [] : [one('loss')]),
  ];
}

const hasDelay = (has: Has) => has('delay') || has('velocity') || has('dk');

/** Declared impedance, loss and delay, or a layer of a stackup with a width (and gap in a pair) or an impedance. */
function trace(has: Has, singleEnded: boolean): MissingKey[] {
  const missing = has('length') ? [] : [one('length')];
  if (!has('width') && !has('impedance')) missing.push({ anyOf: ['width', 'impedance'], for: 'impedance' });
  if (has('width') && !has('gap') && !singleEnded) missing.push(one('gap', 'impedance of a pair'));
  const declared = has('impedance') && hasDelay(has) && has('loss') && !has('width');
  if (!declared) for (const key of ['stackup', 'layer']) if (!has(key)) missing.push(one(key, 'delay and loss'));
  return missing;
}

const needs: Record<ElementKindName, (has: Has, singleEnded: boolean) => MissingKey[]> = {
  package: segment,
  cable: segment,
  trace,
  via: (has, singleEnded) =>
    ['stackup', 'drill', 'antipad', ...(singleEnded ? [] : ['pitch'])]
      .filter((key) => !has(key))
      .map((key) => one(key)),
  connector: (has) => ['delay', 'impedance'].filter((key) => !has(key)).map((key) => one(key)),
  capacitor: (has) => (has('value') ? [] : [one('value')]),
  stub: (has) => ['length', 'impedance', 'dk'].filter((key) => !has(key)).map((key) => one(key)),
  block: () => [one('touchstone')],
};

/**
 * What the model of an element needs and does not find.
 * @param values the element's keys, its part merged in; which keys there are counts, not what they hold
 * @returns none where `touchstone` takes the place of geometry
 */
export function missingKeys(kind: ElementKindName, values: object, singleEnded: boolean): MissingKey[] {
  const has: Has = (key) => Object.hasOwn(values, key) && (values as Record<string, unknown>)[key] !== undefined;
  return has('touchstone') ? [] : needs[kind](has, singleEnded);
}

/**
 * The missing keys as one problem of the entry, with a fix for each that adds its example.
 * @param namesFor what is at hand for a key that names something, in place of the example; undefined for any other key
 */
export function missingKeyProblems(
  kind: ElementKindName,
  missing: readonly MissingKey[],
  namesFor: (key: string) => readonly string[] | undefined = () => undefined,
): FormatProblem[] {
  if (missing.length === 0) return [];
  const keys = missing.map(({ anyOf }) =>
    listed(
      anyOf.map((key) => `\`${key}\``),
      'or',
    ),
  );
  const fixes = missing.flatMap(({ anyOf }) =>
    anyOf.flatMap((key) => {
      const names = namesFor(key);
      // a number of ours is none of this design: its title says so
      const verb = names ? 'Add' : 'Add the example';
      return (names ?? exampleOf(kind, key)).map((text) => ({
        title: `${verb} \`${key}: ${text}\``,
        edits: [{ op: 'set' as const, path: [], key, text }],
      }));
    }),
  );
  const message = `This ${kind} lacks ${listed(keys)}; until then it counts as a straight through.`;
  return [{ rule: 'schema', path: [kind], on: 'entry', message, fixes }];
}

const exampleOf = (kind: ElementKindName, key: string): readonly string[] =>
  (schemas[kind].properties?.[key]?.examples ?? []).slice(0, 1).map(String);
