// The build of mocha for browsers sets globals and takes its tests from them; it runs in the worker too.
import 'mocha/mocha';
import { defineSuite } from './all';
import { report } from './report';

declare const mocha: {
  setup(options: object): void;
  run(done: (failures: number) => void): Parameters<typeof report>[0];
};

/** Called by the worker's extension host; rejects if a test failed. */
export function run(): Promise<void> {
  mocha.setup({ ui: 'bdd', timeout: 30_000, reporter: class {} });
  defineSuite();
  return new Promise((resolve, reject) =>
    report(mocha.run((failures) => (failures ? reject(new Error(`${failures} failed`)) : resolve()))),
  );
}
