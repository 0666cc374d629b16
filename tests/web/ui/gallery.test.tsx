import axe from 'axe-core';
import { SchoolShell } from '@/components/shell';
import { Gallery } from './Gallery';
import { installBrowserParts, setWidth, show } from './harness';

jest.mock('expo-router', () => jest.requireActual<typeof import('./expoRouter')>('./expoRouter'));

beforeAll(() => {
  installBrowserParts();
  rememberStyles();
});

// Colour contrast is tested on the tokens themselves, in both schemes; jsdom computes no colours behind text.
const options: axe.RunOptions = { rules: { 'color-contrast': { enabled: false } }, resultTypes: ['violations'] };

/** jsdom computes a style anew from every rule each time it is asked, and the rules ask many times; nothing changes meanwhile. */
function rememberStyles(): void {
  const compute = window.getComputedStyle.bind(window);
  const known = new WeakMap<Element, CSSStyleDeclaration>();
  window.getComputedStyle = (element, pseudo) => {
    if (pseudo) return compute(element, pseudo);
    const style = known.get(element) ?? compute(element);
    known.set(element, style);
    return style;
  };
}

const timeoutMs = 240_000;

it.each([['a phone', 390], ['a wide window', 1280]])(
  'every primitive passes the accessibility rules on %s',
  async (_, width) => {
    setWidth(width);
    document.documentElement.lang = 'en';
    const { container } = show(
      <SchoolShell>
        <Gallery />
      </SchoolShell>,
    );
    const { violations } = await axe.run(container.ownerDocument, options);
    expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html.slice(0, 160)).join(' | ')}`)).toEqual([]);
  },
  timeoutMs,
);
