import { describe, expect, test } from 'vitest';
import { rememberDeaths } from './deaths';

const MINUTE = 60_000;

/** A memory with a clock that only the test moves. */
function withClock() {
  const clock = { now: 0 };
  return { clock, deaths: rememberDeaths(() => clock.now) };
}

/** The server dies while it works on a file. */
function dieAt(deaths: ReturnType<typeof rememberDeaths>, ...uris: string[]) {
  for (const uri of uris) deaths.analysing(uri, true);
  return deaths.died();
}

describe('a file whose analysis was running at two deaths', () => {
  test('is opened without analysis from the second on', () => {
    const { deaths } = withClock();
    expect(dieAt(deaths, 'file:///bad').skippedNow).toEqual([]);
    expect(deaths.skipped()).toEqual([]);
    expect(dieAt(deaths, 'file:///bad').skippedNow).toEqual(['file:///bad']);
    expect(deaths.skipped()).toEqual(['file:///bad']);
  });

  test('is announced once, and stays skipped', () => {
    const { deaths } = withClock();
    dieAt(deaths, 'file:///bad');
    dieAt(deaths, 'file:///bad');
    expect(deaths.died().skippedNow).toEqual([]);
    expect(deaths.skipped()).toEqual(['file:///bad']);
  });

  test('is forgiven alone when a person asks for its analysis', () => {
    const { deaths } = withClock();
    dieAt(deaths, 'file:///bad', 'file:///worse');
    dieAt(deaths, 'file:///bad', 'file:///worse');
    deaths.forgive('file:///bad');
    expect(deaths.skipped()).toEqual(['file:///worse']);
  });
});

describe('a death counts against no file', () => {
  test('that was idle', () => {
    const { deaths } = withClock();
    for (let i = 0; i < 2; i++) {
      deaths.analysing('file:///good', true);
      deaths.analysing('file:///good', false);
      deaths.died();
    }
    expect(deaths.skipped()).toEqual([]);
  });

  test('twice for one running analysis', () => {
    const { deaths } = withClock();
    dieAt(deaths, 'file:///good');
    deaths.died();
    expect(deaths.skipped()).toEqual([]);
  });
});

describe('the server is started again', () => {
  test('four times within three minutes, not a fifth', () => {
    const { deaths } = withClock();
    expect([1, 2, 3, 4, 5].map(() => deaths.died().restart)).toEqual([true, true, true, true, false]);
  });

  test('without end if it dies seldom', () => {
    const { deaths, clock } = withClock();
    for (let i = 0; i < 20; i++) {
      expect(deaths.died().restart).toBe(true);
      clock.now += MINUTE;
    }
  });

  test('once more when a person says so', () => {
    const { deaths } = withClock();
    for (let i = 0; i < 5; i++) deaths.died();
    deaths.forgive();
    expect(deaths.died().restart).toBe(true);
  });
});
