import { afterEach, beforeEach, expect, vi } from 'vitest';

/** Console output that no test asked for is a fault: it hides the lines that matter. */
const LEVELS = ['log', 'info', 'warn', 'error', 'debug'] as const;

beforeEach(() => {
  for (const level of LEVELS) vi.spyOn(console, level).mockImplementation(() => {});
});

afterEach(() => {
  const said = LEVELS.flatMap((level) => {
    // A test that expects output takes the spy's calls and clears it.
    const calls = vi.isMockFunction(console[level]) ? vi.mocked(console[level]).mock.calls : [];
    return calls.map((call) => `${level}: ${call.map(String).join(' ')}`);
  });
  vi.restoreAllMocks();
  expect(said, 'unasked console output').toEqual([]);
});
