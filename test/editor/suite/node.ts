import Mocha from 'mocha';
import { defineSuite } from './all';
import { report } from './report';

/** Called by the extension host; rejects if a test failed. */
export function run(): Promise<void> {
  const mocha = new Mocha({ ui: 'bdd', timeout: 30_000, reporter: class {} as never });
  mocha.suite.emit('pre-require', globalThis as never, '', mocha);
  defineSuite();
  return new Promise((resolve, reject) =>
    report(mocha.run((failures) => (failures ? reject(new Error(`${failures} failed`)) : resolve()))),
  );
}
