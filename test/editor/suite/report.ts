interface Runner {
  on(event: 'pass' | 'fail', listener: (test: { fullTitle(): string }, error?: Error) => void): unknown;
}

/** One line a test on the console, which `test/editor/run.mjs` reads. */
export function report(runner: Runner): void {
  runner.on('pass', (test) => console.log(`[suite] ok ${test.fullTitle()}`));
  runner.on('fail', (test, error) =>
    console.log(
      `[suite] FAILED ${test.fullTitle()}: ${error?.message ?? ''} ${error?.stack?.split('\n').slice(1, 3).join(' ') ?? ''}`,
    ),
  );
}
