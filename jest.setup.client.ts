import "@testing-library/jest-dom";
import { TextEncoder } from "node:util";

// jsdom has no layout, so what measures the page gets quiet stand-ins; a test that depends on one
// of them replaces it itself.
const noMediaMatches = (query: string): MediaQueryList => ({
  matches: false,
  media: query,
  onchange: null,
  addListener: () => undefined,
  removeListener: () => undefined,
  addEventListener: () => undefined,
  removeEventListener: () => undefined,
  dispatchEvent: () => false,
});

class QuietResizeObserver implements ResizeObserver {
  observe(): void {}
  unobserve(): void {}
  disconnect(): void {}
}

if (typeof window !== "undefined") {
  // Browsers have it; jsdom leaves it out.
  window.TextEncoder ??= TextEncoder;
  window.matchMedia ??= noMediaMatches;
  window.scrollTo = () => undefined;
  window.ResizeObserver ??= QuietResizeObserver;
}
