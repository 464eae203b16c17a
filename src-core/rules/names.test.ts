import { readdirSync, readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { rules } from './list';

/** Every name under which a stage reports, found in its source. */
function* namesReported() {
  const core = new URL('../', import.meta.url);
  for (const folder of ['text', 'format', 'model', 'elements', 'networks', 'cascade', 'link']) {
    for (const file of readdirSync(new URL(`${folder}/`, core))) {
      if (!file.endsWith('.ts') || file.endsWith('.test.ts')) continue;
      const source = readFileSync(new URL(`${folder}/${file}`, core), 'utf8');
      for (const [, name] of source.matchAll(/\brule: '([a-z-]+)'/g)) yield { name, file: `${folder}/${file}` };
    }
  }
}

test('whatever a stage reports has its rule, with a severity and a paragraph', () => {
  const known = new Set(rules.map(({ name }) => name));
  const reported = [...namesReported()];
  expect(reported.length).toBeGreaterThan(10);
  expect(reported.filter(({ name }) => !known.has(name))).toEqual([]);
});
