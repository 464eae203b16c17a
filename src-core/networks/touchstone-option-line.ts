/** What the option line `# unit parameter format R ohms` says; what it leaves out is GHz, S, MA and R 50. */
export interface OptionLine {
  readonly unitHz: number;
  readonly parameter: 'S' | 'Y' | 'Z' | 'G' | 'H';
  readonly format: 'RI' | 'MA' | 'DB';
  /** One for all ports, or one a port. */
  readonly referenceOhms: readonly number[];
}

export const defaultOptions: OptionLine = { unitHz: 1e9, parameter: 'S', format: 'MA', referenceOhms: [50] };

const units: Readonly<Record<string, number>> = { HZ: 1, KHZ: 1e3, MHZ: 1e6, GHZ: 1e9 };
const parameters = new Set(['S', 'Y', 'Z', 'G', 'H']);
const formats = new Set(['RI', 'MA', 'DB']);

/**
 * @param words the option line's words without `#`, in any order; numbers follow R
 * Source: Touchstone 1.1, IBIS Open Forum 2002; a number for each port as in its 2023 addition. Check values F-02, F-12.
 */
export function readOptionLine(
  words: readonly string[],
  ports: number | undefined,
): { options: OptionLine; problem?: string } {
  let options = defaultOptions;
  for (let i = 0; i < words.length; i++) {
    const word = words[i].toUpperCase();
    if (Object.hasOwn(units, word)) options = { ...options, unitHz: units[word] };
    else if (parameters.has(word)) options = { ...options, parameter: word as OptionLine['parameter'] };
    else if (formats.has(word)) options = { ...options, format: word as OptionLine['format'] };
    else if (word === 'R') {
      const ohms: number[] = [];
      while (i + 1 < words.length && /^[+.\d]/.test(words[i + 1])) ohms.push(Number(words[++i]));
      if (ohms.length === 0 || !ohms.every((ohm) => Number.isFinite(ohm) && ohm > 0)) {
        return { options, problem: 'After `R` stands the reference resistance in ohm, above 0: `R 50`.' };
      }
      if (ohms.length > 1 && ports !== undefined && ohms.length !== ports) {
        return {
          options,
          problem: `After \`R\` stand ${ohms.length} resistances; the file has ${ports} ports: give one for all or one for each.`,
        };
      }
      options = { ...options, referenceOhms: ohms };
    } else {
      return {
        options,
        problem: `\`${words[i].slice(0, 40)}\` is not known in an option line; it reads like \`# GHz S MA R 50\`.`,
      };
    }
  }
  if ((options.parameter === 'G' || options.parameter === 'H') && ports !== undefined && ports !== 2) {
    return { options, problem: `${options.parameter} parameters exist for two ports only; the file has ${ports}.` };
  }
  return { options };
}
