import { cleanup } from '@testing-library/react';
import { afterEach, beforeEach, expect, vi } from 'vitest';

// A warning or error that nobody expected fails the test.
beforeEach(() => {
  vi.spyOn(console, 'error').mockImplementation((...words: unknown[]) => {
    expect.fail(`console.error: ${words.map(String).join(' ')}`);
  });
});
afterEach(() => {
  cleanup();
  vi.restoreAllMocks();
});
