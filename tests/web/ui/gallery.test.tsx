import axe from 'axe-core';
import { SchoolShell } from '@/components/shell';
import { Gallery } from './Gallery';
import { installBrowserParts, setWidth, show } from './harness';

jest.mock('expo-router', () => jest.requireActual('./expoRouter'));

beforeAll(installBrowserParts);

// Colour contrast is tested on the tokens themselves, in both schemes; jsdom computes no colours behind text.
const options: axe.RunOptions = { rules: { 'color-contrast': { enabled: false } }, resultTypes: ['violations'] };

// jsdom computes styles slowly, and the page holds every primitive there is.
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
