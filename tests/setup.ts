import { afterEach, beforeEach, expect, vi, type MockInstance } from 'vitest';

/** An error that the code logged and the test did not expect is a failure of that test. */
let consoleError: MockInstance<typeof console.error>;

beforeEach(() => {
  consoleError = vi.spyOn(console, 'error');
});

afterEach(() => {
  const calls = consoleError.mock.calls;
  consoleError.mockRestore();
  expect(calls, 'unexpected console.error').toEqual([]);
});
