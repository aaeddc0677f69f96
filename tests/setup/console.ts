import { afterEach, expect, vi } from "vitest";

// A test that provokes console.error on purpose mocks it itself; any other call is a defect.
const spy = vi.spyOn(console, "error");
afterEach(() => {
  const calls = spy.mock.calls.slice();
  spy.mockClear();
  expect(calls, "console.error was called").toEqual([]);
});
