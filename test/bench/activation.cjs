// What activating the extension costs the editor's extension host, in a fresh process: loading its bundle, and `activate` until it
// waits for the server. The editor is a stand-in that answers anything, so its own part (a few registrations) is left out.
const { readFileSync } = require('node:fs');
const Module = require('node:module');

function anything() {
  const answers = new Map();
  return new Proxy(class {}, {
    get(target, key) {
      if (key === 'prototype') return target.prototype;
      if (key === 'then') return undefined;
      if (key === Symbol.toPrimitive) return () => '1.91.0';
      if (key === Symbol.iterator) return function* () {};
      if (key === 'version') return '1.91.0';
      if (!answers.has(key)) answers.set(key, anything());
      return answers.get(key);
    },
    set: () => true,
    apply: anything,
    construct: anything,
  });
}

// A bundle copies the editor's own names, so that they must be there to be copied.
const declared = readFileSync(require.resolve('@types/vscode/index.d.ts'), 'utf8');
const names = [...declared.matchAll(/export (?:abstract )?(?:namespace|class|enum|const|function) (\w+)/g)].map(
  (match) => match[1],
);
const editor = Object.fromEntries(names.map((name) => [name, anything()]));
editor.version = '1.91.0';
const load = Module._load;
Module._load = function (request, ...rest) {
  return request === 'vscode' ? editor : load.call(this, request, ...rest);
};

const start = performance.now();
const before = process.cpuUsage();
const { activate } = require(process.argv[2]);
const loaded = performance.now() - start;
// Throws where the stand-in cuts it short, so that what is printed is the whole of it; the server is started and not waited for.
activate(anything());
const { user, system } = process.cpuUsage(before);
process.stdout.write(JSON.stringify({ loaded, whole: performance.now() - start, processor: (user + system) / 1000 }));
process.exit(0);
