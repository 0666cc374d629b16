// jsdom lacks what the browser brings along; fonts need no loading to test words and roles.
jest.mock('expo-font', () => ({
  useFonts: () => [true, null],
  loadAsync: () => Promise.resolve(),
  isLoaded: () => true,
  isLoading: () => false,
  renderToImageAsync: () => Promise.reject(new Error('no pictures of glyphs in jsdom')),
}));

class ResizeObserverStub implements ResizeObserver {
  observe(): void {}
  unobserve(): void {}
  disconnect(): void {}
}
globalThis.ResizeObserver = ResizeObserverStub;

window.matchMedia = (query: string): MediaQueryList =>
  Object.assign(new EventTarget(), {
    matches: false, media: query, onchange: null, addListener: () => undefined, removeListener: () => undefined,
  });
