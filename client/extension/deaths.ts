/** The server restarts by itself at most this often within the window; then a person decides. */
const MOST_RESTARTS = 4;
const WINDOW_MILLISECONDS = 3 * 60 * 1000;
/** A file whose analysis was running at so many deaths is opened without analysis. */
const DEATHS_OF_A_FILE = 2;

/**
 * What is remembered of the server's deaths: which files were being analysed when it died, and whether it dies too often.
 * A death while idle counts against no file.
 */
export function rememberDeaths(now: () => number = Date.now) {
  const running = new Set<string>();
  const deathsOf = new Map<string, number>();
  let deaths: number[] = [];
  return {
    analysing(uri: string, isRunning: boolean) {
      if (isRunning) running.add(uri);
      else running.delete(uri);
    },
    /** @returns whether to restart, and the files that are skipped from now on */
    died(): { restart: boolean; skippedNow: readonly string[] } {
      const suspects = [...running];
      running.clear();
      for (const uri of suspects) deathsOf.set(uri, (deathsOf.get(uri) ?? 0) + 1);
      deaths = [...deaths.filter((time) => now() - time < WINDOW_MILLISECONDS), now()];
      return {
        restart: deaths.length <= MOST_RESTARTS,
        skippedNow: suspects.filter((uri) => deathsOf.get(uri) === DEATHS_OF_A_FILE),
      };
    },
    skipped: (): readonly string[] =>
      [...deathsOf].filter(([, count]) => count >= DEATHS_OF_A_FILE).map(([uri]) => uri),
    forgive(uri?: string) {
      if (uri === undefined) deathsOf.clear();
      else deathsOf.delete(uri);
      deaths = [];
    },
  };
}

export type Deaths = ReturnType<typeof rememberDeaths>;
