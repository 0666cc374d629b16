import axe from 'axe-core';
import { SchoolShell } from '@/components/shell';
import { Gallery } from './Gallery';
import { installBrowserParts, setWidth, show } from './harness';

jest.mock('expo-router', () => jest.requireActual('./expoRouter'));

beforeAll(installBrowserParts);

// Colour contrast is tested on the tokens themselves; jsdom computes no colours behind text.
const rules = { 'color-contrast': { enabled: false } };

describe.each([['a phone', 390], ['two panes', 800], ['a wide window', 1280]])('every primitive on %s', (_, width) => {
  it.each(['light', 'dark'] as const)('passes the accessibility rules in the %s scheme', async (scheme) => {
    setWidth(width);
    document.documentElement.lang = 'en';
    const { container } = show(
      <SchoolShell>
        <Gallery />
      </SchoolShell>,
      { scheme },
    );
    const { violations } = await axe.run(container.ownerDocument, { rules });
    expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html.slice(0, 160)).join(' | ')}`)).toEqual([]);
  });
});
