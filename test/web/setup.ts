import { jest } from '@jest/globals';
import { setupZonelessTestEnv } from 'jest-preset-angular/setup-env/zoneless/index.mjs';

setupZonelessTestEnv();
// Harnesses wait for Material's animations and for a machine that does other work too.
jest.setTimeout(20_000);

/** What jsdom lacks and Material or OpenLayers ask for on construction. */
class NoResizeObserver implements ResizeObserver {
  observe(): void {}
  unobserve(): void {}
  disconnect(): void {}
}
globalThis.ResizeObserver ??= NoResizeObserver;
globalThis.matchMedia ??= (query: string) =>
  ({
    matches: false,
    media: query,
    addEventListener: () => undefined,
    removeEventListener: () => undefined,
    // The CDK still asks by the old names.
    addListener: () => undefined,
    removeListener: () => undefined,
  }) as unknown as MediaQueryList;
