import fc from 'fast-check';
import { expect, test } from 'vitest';
import { inertJson, relativeUri, visible, xml } from './escape';

const STEERS = /[\u0000-\u0008\u000b-\u001f\u007f-\u009f\u061c\u200e\u200f\u2028\u2029\u202a-\u202e\u2066-\u2069]/;

test('what steers a terminal, turns the direction or is no character is shown, not meant', () => {
  expect(visible('a\u001b[31m\u202eb\ud800c\uffff')).toBe('a\\u001b[31m\\u202eb\\ud800c\\uffff');
  expect(visible('Überlauf 10 Ω 😀')).toBe('Überlauf 10 Ω 😀');
});

test('nothing in a line is read as a workflow command', () => {
  expect(visible('  ::add-mask::x')).toBe('  \\u003a:add-mask::x');
  expect(visible('a ##[error]x')).toBe('a \\u0023#[error]x');
  expect(visible('a::b')).toBe('a::b');
});

test('XML: no markup, no illegal character, whatever the text', () => {
  expect(xml(`<a b="c">'&]]>`)).toBe('&lt;a b=&quot;c&quot;&gt;&apos;&amp;]]&gt;');
  fc.assert(
    fc.property(fc.string({ unit: 'binary', maxLength: 40 }), (text) => {
      expect(xml(text)).not.toMatch(/[<>"']|&(?!(amp|lt|gt|quot|apos);)/);
      expect(xml(text)).not.toMatch(STEERS);
      expect(Buffer.from(xml(text)).toString()).toBe(xml(text));
    }),
  );
});

test('a path is a relative URI, without scheme, query or fragment', () => {
  expect(relativeUri('lanes/a b#1?.channel.yaml')).toBe('lanes/a%20b%231%3F.channel.yaml');
  expect(relativeUri('data:x/ü.channel.yaml')).toBe('data%3Ax/%C3%BC.channel.yaml');
  expect(relativeUri('\ud800')).toBe('%5Cud800');
  fc.assert(
    fc.property(fc.string({ unit: 'grapheme', minLength: 1, maxLength: 30 }), (name) => {
      const file = `lanes/${name.replaceAll('/', '').replace(/^\.+$/, 'x')}`;
      const { pathname, search, hash, host } = new URL(relativeUri(file), 'https://root.example/');
      expect([search, hash, host]).toEqual(['', '', 'root.example']);
      expect(decodeURIComponent(pathname)).toBe(`/${file}`);
    }),
  );
});

test('JSON is inert as bytes and gives every character back', () => {
  fc.assert(
    fc.property(fc.string({ unit: 'binary' }), (text) => {
      expect(inertJson([text])).not.toMatch(STEERS);
      expect(JSON.parse(inertJson([text]))).toEqual([text]);
    }),
  );
});
