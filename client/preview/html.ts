export interface PageParts {
  /** Fresh for each load: at least 128 random bits, letters and digits. */
  readonly nonce: string;
  /** The webview's own source, as its host gives it. */
  readonly cspSource: string;
  readonly scriptUri: string;
  readonly styleUri: string;
}

const escaped = (text: string) => text.replace(/[&<>"']/g, (character) => `&#${character.charCodeAt(0)};`);

/** The preview's page: no text of a file in it, no inline style, one script by nonce; data comes by message. */
export function pageHtml({ nonce, cspSource, scriptUri, styleUri }: PageParts): string {
  if (!/^[A-Za-z0-9+/_-]+=*$/.test(nonce)) throw new RangeError('The nonce must be base64 or alphanumeric.');
  const policy = `default-src 'none'; script-src 'nonce-${nonce}'; style-src ${cspSource}; img-src ${cspSource} data:`;
  return `<!DOCTYPE html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${escaped(policy)}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<link rel="stylesheet" href="${escaped(styleUri)}">
<title>Channel preview</title>
</head>
<body>
<main id="preview"><h1 class="hidden">Channel preview</h1><p class="nothing">The channel is being computed.</p></main>
<script nonce="${nonce}" src="${escaped(scriptUri)}"></script>
</body>
</html>
`;
}
