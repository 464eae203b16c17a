import type { SchemaName } from '../../schemas/format/types';
import { schemas } from '../../schemas/generated/format';
import { type SchemaError, validators } from '../../schemas/generated/validators';
import { isMapping } from '../raw';
import { pathOf, valueAt } from './node-at';
import type { FormatProblem } from './problem';
import { problemOf } from './schema-error';
import { wrongType } from './wanted';

/** Beyond what is shown of a file they are counted, not read. */
const MOST_PROBLEMS = 1000;

/**
 * Checks a mapping against the schema of its kind: unknown, missing and reserved keys, wrong types. Quantities are text here;
 * `readValues` reads them.
 * @returns at most one problem a place, in words, never a failure of alternatives
 */
export function validateEntry(name: SchemaName, value: unknown): FormatProblem[] {
  if (!isMapping(value)) return [wrongType([], schemas[name], value, name)];
  const validate = validators[name];
  if (validate(value)) return [];
  const found = new Map<string, FormatProblem>();
  for (const error of meantErrors(validate.errors ?? [], value)) {
    const problem = problemOf(error, name, value);
    if (!problem) continue;
    const place = JSON.stringify([
      problem.path,
      problem.on === 'entry' || problem.lacks !== undefined ? problem.message : problem.on,
    ]);
    if (!found.has(place)) found.set(place, problem);
    if (found.size >= MOST_PROBLEMS) break;
  }
  return withoutMisspelt([...found.values()]);
}

/** A key that is missing because it is misspelt is one problem, the misspelling. */
function withoutMisspelt(problems: FormatProblem[]): FormatProblem[] {
  const renames = problems.flatMap(({ fixes }) =>
    fixes.flatMap(({ edits }) => edits.filter((edit) => edit.op === 'key')),
  );
  const isMisspelt = ({ path, lacks }: FormatProblem) =>
    lacks !== undefined && renames.some((edit) => edit.name === lacks && samePath(edit.path.slice(0, -1), path));
  return problems.filter((problem) => !isMisspelt(problem));
}

const samePath = (a: readonly unknown[], b: readonly unknown[]) => JSON.stringify(a) === JSON.stringify(b);

/** Where alternatives failed, the errors of the one that was meant: a mapping means the alternative with keys. */
function meantErrors(errors: readonly SchemaError[], value: unknown): SchemaError[] {
  const choices = errors.filter((error) => error.keyword === 'anyOf');
  if (choices.length === 0) return [...errors];
  const inMapping = (choice: SchemaError) => isMapping(valueAt(value, pathOf(choice.instancePath, value)));
  const isWithin = (error: SchemaError, choice: SchemaError) =>
    error !== choice &&
    error.schemaPath.startsWith(`${choice.schemaPath}/`) &&
    error.instancePath.startsWith(choice.instancePath);
  const isOtherType = (error: SchemaError, choice: SchemaError) =>
    error.instancePath === choice.instancePath && (error.keyword === 'type' || error.keyword === 'const');
  return errors.filter((error) => {
    if (error.keyword === 'anyOf')
      return !inMapping(error) || !errors.some((one) => isWithin(one, error) && !isOtherType(one, error));
    const choice = choices.find((one) => isWithin(error, one));
    return !choice || (inMapping(choice) && !isOtherType(error, choice));
  });
}
