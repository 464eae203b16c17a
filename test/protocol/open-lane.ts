import { afterAll, beforeAll } from 'vitest';
import { type Client, type Folder, folderWith, startClient } from './client';
import { LANE, PARTS } from './lane';

export const EVERYWHERE = { start: { line: 0, character: 0 }, end: { line: 1000, character: 0 } };

/** Where a piece of a text begins, or `extra` characters behind that. */
export const positionOf = (text: string, needle: string, extra = 0) => {
  const before = text.slice(0, text.indexOf(needle) + extra).split('\n');
  return { line: before.length - 1, character: before[before.length - 1].length };
};

/** A server with the lane `a` open, beside it the closed lane `b`, both over one board; for all tests of a file. */
export function withOpenLane() {
  const open = {} as { folder: Folder; client: Client; lane: string; parts: string };
  beforeAll(async () => {
    // A name as people have them: a letter beyond ASCII and a space.
    open.folder = await folderWith(
      { 'a.channel.yaml': LANE, 'b.channel.yaml': LANE, 'boards/main.parts.yaml': PARTS },
      'Früh sortiert',
    );
    open.client = await startClient({ folders: [open.folder.uri()] });
    open.lane = open.folder.uri('a.channel.yaml');
    open.parts = open.folder.uri('boards/main.parts.yaml');
    await open.client.open(open.lane, LANE);
  }, 60000);
  afterAll(async () => {
    await open.client?.stop();
    await open.folder?.remove();
  });
  return {
    open,
    /** A request at a place of the lane. */
    ask: <R>(method: string, text: string, needle: string, extra = 0, more: object = {}) =>
      open.client.request<R>(`textDocument/${method}`, {
        textDocument: { uri: open.lane },
        position: positionOf(text, needle, extra),
        ...more,
      }),
    /** Shows another text in the lane for the length of a test. */
    async typed<T>(text: string, during: () => Promise<T>): Promise<T> {
      await open.client.change(open.lane, text);
      try {
        return await during();
      } finally {
        await open.client.change(open.lane, LANE);
      }
    },
  };
}
