import '@testing-library/jest-dom/vitest';
import { cleanup, configure } from '@testing-library/react';
import { afterEach, beforeEach, vi, type MockInstance } from 'vitest';

// A page whose parts load lazily takes its time on a busy machine.
configure({ asyncUtilTimeout: 8_000 });

/** What jsdom lacks and the interface's parts ask for. */
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
window.ResizeObserver ??= class {
  observe(): void {}
  unobserve(): void {}
  disconnect(): void {}
};
Element.prototype.scrollIntoView ??= () => undefined;
Range.prototype.getClientRects ??= () => Object.assign([], { item: () => null }) as unknown as DOMRectList;
Range.prototype.getBoundingClientRect ??= () => new DOMRect();

let errors: MockInstance<typeof console.error>;

beforeEach(() => {
  errors = vi.spyOn(console, 'error');
});

/** An error on the console that the test did not expect fails it; a test that expects one clears the spy. */
afterEach(() => {
  cleanup();
  const said = errors.mock.calls.map((call) => call.map(String).join(' '));
  errors.mockRestore();
  if (said.length > 0) throw new Error(`The console had errors that no test expected:\n${said.join('\n')}`);
});
