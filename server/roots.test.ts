import { describe, expect, test } from 'vitest';
import { idOf, keepRoots, spelledAlike } from './roots';

const rootsOf = (...uris: string[]) => {
  const roots = keepRoots();
  roots.set(uris);
  return roots;
};

describe('a URI and a path below a root', () => {
  test.each([
    ['file:///work/lanes', 'file:///work/lanes/a.channel.yaml', 'a.channel.yaml'],
    [
      'file:///work/Fr%C3%BCh%20sortiert',
      'file:///work/Fr%C3%BCh%20sortiert/b/%C3%BC.channel.yaml',
      'b/ü.channel.yaml',
    ],
    ['file:///c%3A/work', 'file:///C:/work/a.channel.yaml', 'a.channel.yaml'],
    ['file://server/share/work', 'file://server/share/work/a.channel.yaml', 'a.channel.yaml'],
    [
      'vscode-vfs://github/team/repository',
      'vscode-vfs://github/team/repository/lanes/a.channel.yaml',
      'lanes/a.channel.yaml',
    ],
    ['vscode-test-web://mount', 'vscode-test-web://mount/a.channel.yaml', 'a.channel.yaml'],
  ])('%s holds %s as %s, and back', (root, uri, file) => {
    const roots = rootsOf(root);
    const located = roots.locate(uri);
    expect(located.file).toBe(file);
    expect(idOf(roots.locate(roots.uriOf(located)))).toBe(idOf(located));
  });
  test('the innermost folder counts; outside all of them a file’s own', () => {
    const roots = rootsOf('file:///work', 'file:///work/inner');
    expect(roots.locate('file:///work/inner/a.channel.yaml').file).toBe('a.channel.yaml');
    expect(roots.locate('file:///workshop/b/c.channel.yaml')).toMatchObject({
      file: 'c.channel.yaml',
      root: { uri: 'file:///workshop/b' },
    });
  });
  test('folders come and go', () => {
    const roots = rootsOf('file:///a');
    roots.change(['file:///b'], ['file:///a']);
    expect(roots.all().map(({ uri }) => uri)).toEqual(['file:///b']);
  });
  test('signs that mean something in a URI are part of a name', () => {
    const roots = rootsOf('file:///work');
    const located = roots.locate('file:///work/50%25%20%23%3F.channel.yaml');
    expect(located.file).toBe('50% #?.channel.yaml');
    expect(roots.uriOf(located)).toBe('file:///work/50%25%20%23%3F.channel.yaml');
  });
});

test('a broken escape stays as it is', () => {
  expect(spelledAlike('file:///a/%E0%A4%A.yaml')).toContain('%');
  expect(spelledAlike('file:///a/%zz.yaml')).toBe('file:///a/%zz.yaml');
});
