import { SESSION_HINT_COOKIE } from '@faintward/contracts/accounts';
import '@testing-library/jest-dom/vitest';
import { cleanup, configure } from '@testing-library/react';
import { afterEach, beforeEach, vi } from 'vitest';

// How long a find waits: a loaded machine is no failure.
configure({ asyncUtilTimeout: 20_000 });

beforeEach(() => {
  // No test reaches a network: each says what the server answers, and an unexpected request fails.
  vi.stubGlobal('fetch', (input: RequestInfo | URL) =>
    Promise.reject(new Error(`Unexpected request: ${input instanceof Request ? input.url : String(input)}`)),
  );
  localStorage.clear();
  // As after signing in: who is signed in is what the test answers to GET /session.
  document.cookie = `${SESSION_HINT_COOKIE}=1`;
});

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
  vi.restoreAllMocks();
});

// jsdom draws nothing and so has no media queries.
window.matchMedia ??= (query: string) =>
  ({
    matches: false,
    media: query,
    onchange: null,
    addEventListener: () => undefined,
    removeEventListener: () => undefined,
    addListener: () => undefined,
    removeListener: () => undefined,
    dispatchEvent: () => false,
  }) satisfies MediaQueryList;
