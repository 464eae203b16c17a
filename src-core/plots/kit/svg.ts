/** Characters that XML 1.0 does not allow, and the marks that turn the direction of text around. */
const unwanted = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069\ufffe\uffff]/g;

/** Text for HTML and SVG, content and attribute alike. */
export function escapeMarkup(text: string): string {
  return withoutLoneSurrogates(text.replace(unwanted, ''))
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;')
    .replace(/"/g, '&quot;')
    .replace(/'/g, '&#39;');
}

function withoutLoneSurrogates(text: string): string {
  return text.replace(/[\ud800-\udbff][\udc00-\udfff]|[\ud800-\udfff]/g, (found) =>
    found.length === 2 ? found : '\ufffd',
  );
}

/** A coordinate with two decimals, the same bytes on every machine; a caller hands in finite numbers only. */
export function px(value: number): string {
  const rounded = Math.round(value * 100) / 100;
  return String(rounded === 0 ? 0 : rounded);
}

export type Attributes = Readonly<Record<string, string | number | undefined>>;

/** One SVG element. Attribute values are escaped; `content` is markup already. */
export function tag(name: string, attributes: Attributes, content?: string): string {
  let text = `<${name}`;
  for (const key in attributes) {
    const value = attributes[key];
    if (value === undefined) continue;
    text += ` ${key}="${typeof value === 'number' ? px(value) : escapeMarkup(value)}"`;
  }
  return content === undefined ? `${text}/>` : `${text}>${content}</${name}>`;
}

/** Width of a text in pixels, estimated without a font: good enough to keep labels apart. */
export function textWidth(text: string, fontSize: number): number {
  let units = 0;
  for (const character of text) {
    if ("il.,:;|'! ".includes(character)) units += 0.32;
    else if (character >= 'A' && character <= 'Z') units += 0.7;
    else if (character > '\u2e80') units += 1;
    else units += 0.6;
  }
  return units * fontSize;
}

/** At most `most` characters, with an ellipsis where something was cut. */
export function shortened(text: string, most: number): string {
  const characters = [...text];
  return characters.length <= most ? text : `${characters.slice(0, most - 1).join('')}…`;
}
