/**
 * The value of a plain scalar by YAML 1.2's core schema, whatever directive the text begins with.
 * What would be infinite or no number stays text, so that neither enters a value.
 */
export function resolvePlain(source: string): string | number | boolean | null {
  switch (source) {
    case '':
    case '~':
    case 'null':
    case 'Null':
    case 'NULL':
      return null;
    case 'true':
    case 'True':
    case 'TRUE':
      return true;
    case 'false':
    case 'False':
    case 'FALSE':
      return false;
  }
  if (source.length > 40) return source;
  if (
    /^[-+]?(?:\.[0-9]+|[0-9]+(?:\.[0-9]*)?)(?:[eE][-+]?[0-9]+)?$/.test(source) ||
    /^0o[0-7]+$/.test(source) ||
    /^0x[0-9a-fA-F]+$/.test(source)
  ) {
    const value = Number(source);
    return Number.isFinite(value) ? value : source;
  }
  return source;
}
