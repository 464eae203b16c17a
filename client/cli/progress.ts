import type { Terminal } from './command';

/** One line on stderr, from half a second on, only where a person watches; gone at the end. */
export function startProgress(terminal: Terminal, total: number, what: string) {
  const start = performance.now();
  let shown = false;
  let last = 0;
  return {
    at(done: number) {
      const now = performance.now();
      if (!terminal.watched || now - start < 500 || now - last < 100) return;
      shown = true;
      last = now;
      terminal.note(`\r\u001b[K${done} of ${total} ${what}`);
    },
    end() {
      if (shown) terminal.note('\r\u001b[K');
    },
  };
}
