// What activating the extension costs the editor's extension host, in a fresh process: loading its bundle, and `activate` until it
// waits for the server. The editor is a stand-in that answers anything, so its own part (a few registrations) is left out.
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
    apply: anything,
    construct: anything,
  });
}

const editor = anything();
const load = Module._load;
Module._load = function (request, ...rest) {
  return request === 'vscode' ? editor : load.call(this, request, ...rest);
};

const start = performance.now();
const before = process.cpuUsage();
const { activate } = require(process.argv[2]);
const loaded = performance.now() - start;
// The client then stumbles over the stand-in, at the earliest where it would wait for the server.
Promise.resolve(activate(editor)).catch(() => {});
const { user, system } = process.cpuUsage(before);
process.stdout.write(JSON.stringify({ loaded, whole: performance.now() - start, processor: (user + system) / 1000 }));
process.exit(0);
