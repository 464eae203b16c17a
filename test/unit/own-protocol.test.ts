import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';

/** Name, kind and method of each message in a source. Read as text: the extension's library loads in an editor alone. */
function messages(file: string) {
  const text = readFileSync(file, 'utf8');
  return [...text.matchAll(/export const (\w+) = new (RequestType|NotificationType)<[\s\S]*?>\(\s*'([^']+)',?\s*\)/g)]
    .map(([, name, kind, method]) => `${kind} ${name} '${method}'`)
    .sort();
}

// The extension may not import the server's list, so each writes its own.
test('server and extension speak of the same requests and notifications', () => {
  const ofServer = messages('server/protocol.ts');
  expect(ofServer.length).toBe(readFileSync('server/protocol.ts', 'utf8').split(' = new ').length - 1);
  expect(messages('client/extension/protocol.ts')).toEqual(ofServer);
});
