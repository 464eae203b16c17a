/** Text from a file as a terminal may show it: what steers a terminal or turns the writing direction is made visible. */
export const plain = (text: string) =>
  text.replace(/[\u0000-\u001f\u007f-\u009f\u200e\u200f\u202a-\u202e\u2066-\u2069]/g, (character) =>
    character === '\t' ? ' ' : `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`,
  );
