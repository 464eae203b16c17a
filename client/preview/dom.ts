type Child = Node | string | undefined | false;

/** An element with attributes (`class`, `aria-…`, `data-…`) and children; text is always text. */
export function element<K extends keyof HTMLElementTagNameMap>(
  name: K,
  attributes: Readonly<Record<string, string | undefined>> = {},
  ...children: readonly Child[]
): HTMLElementTagNameMap[K] {
  const made = document.createElement(name);
  for (const [key, value] of Object.entries(attributes)) if (value !== undefined) made.setAttribute(key, value);
  for (const child of children) if (child) made.append(child);
  return made;
}

/** Writes only what differs, so that a screen reader and the focus are left alone. */
export function setText(node: Node, text: string): void {
  if (node.textContent !== text) node.textContent = text;
}

export function setAttribute(node: Element, name: string, value: string | undefined): void {
  if (value === undefined) node.removeAttribute(name);
  else if (node.getAttribute(name) !== value) node.setAttribute(name, value);
}

/** Text in which `code` stands between backticks. */
export function withCode(text: string): Node[] {
  const parts = text.split('`');
  if (parts.length % 2 === 0) return [document.createTextNode(text)];
  return parts.map((part, i) => (i % 2 === 1 ? element('code', {}, part) : document.createTextNode(part)));
}

/** Calls `build` again only if `value` says something else than at the last call for this container. */
export function whenChanged(
  container: Element & { shown?: string },
  value: unknown,
  build: () => readonly Node[],
): void {
  const text = JSON.stringify(value) ?? '';
  if (container.shown === text) return;
  container.shown = text;
  container.replaceChildren(...build());
}
