/**
 * Text from a file as a terminal or a build's log may show it: what steers a terminal, turns the writing direction or would be
 * read as a workflow command (`::` that begins a line, `##[` anywhere) is made visible.
 */
export const plain = (text: string) =>
  text.replace(
    /[\u0000-\u001f\u007f-\u009f\u061c\u200e\u200f\u2028\u2029\u202a-\u202e\u2066-\u2069]|(?<=^\s*):(?=:)|#(?=#\[)/g,
    (character) => (character === '\t' ? ' ' : `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`),
  );
