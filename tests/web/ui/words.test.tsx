import { act, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { ApiProblem, NoAnswer, problemWords } from '@/components/api';
import { RiSgPlot } from '@/components/ui/RiSgPlot';
import * as Ui from '@/components/ui';
import { place } from './expoRouter';
import { installBrowserParts, show } from './harness';

jest.mock('expo-router', () => jest.requireActual<typeof import('./expoRouter')>('./expoRouter'));

beforeAll(installBrowserParts);

describe('Reading', () => {
  // GUM 7.2.6: value and uncertainty to the same place. Examples by hand.
  it.each([
    [1.5661, 0.0042, 'ct', '1.566 ± 0.004 ct'],
    [1.62, 0.006, undefined, '1.620 ± 0.006'],
    [3.5612, 0.0123, undefined, '3.561 ± 0.012'],
    [8.02, 0.0096, 'mm', '8.020 ± 0.010 mm'],
    [250, 12, undefined, '250 ± 12'],
  ])('shows %d with u %d as %s %s', (value, u, unit, text) => {
    expect(Ui.formatMeasured({ value, u, unit })).toBe(text);
  });

  it('leaves words as they are and says nothing of nothing', () => {
    expect(Ui.formatMeasured({ value: 'DR' })).toBe('DR');
    expect(Ui.formatMeasured({ value: null })).toBe('–');
  });
});

describe('Money', () => {
  it.each([[6000, 'EUR', '€60.00'], [500, 'JPY', '¥500'], [-1, 'USD', '-$0.01'], [1234, 'KWD', 'KWD 1.234']])('writes %d minor units of %s as %s', (amount, currency, text) => {
    expect(Ui.formatMoney(amount, currency, 'en-US').replace(/\u00a0/g, ' ')).toBe(text);
  });
});

describe('Days', () => {
  const now = new Date('2026-12-08T09:00:00Z');
  it.each([
    ['2026-12-08T16:00:00Z', 'today'],
    ['2026-12-09T01:00:00Z', 'tomorrow'],
    ['2026-12-11T17:00:00Z', 'Friday'],
    ['2026-12-07T17:00:00Z', 'yesterday'],
    ['2026-12-20T17:00:00Z', 'Sun 20 Dec'],
    ['2027-01-20T17:00:00Z', 'Wed 20 Jan 2027'],
  ])('says %s as %s', (iso, words) => {
    expect(Ui.formatDay(iso, { timeZone: 'Europe/Dublin', now })).toBe(words);
  });

  it('counts days where the school is, not in UTC', () => {
    expect(Ui.formatDay('2026-12-08T23:30:00Z', { timeZone: 'Europe/Athens', now })).toBe('tomorrow');
    expect(Ui.formatTime('2026-12-08T23:30:00Z', { timeZone: 'Europe/Athens' })).toBe('01:30');
  });
});

describe('CodeText', () => {
  it('sets a code in groups of four', () => {
    show(<Ui.CodeText code="K7QF-2M9XA0TB" />);
    expect(screen.getByText('K7QF 2M9X A0TB')).toBeInTheDocument();
  });
});

describe('Failed', () => {
  it('says the refusal in the server’s words and offers another try', async () => {
    const user = userEvent.setup();
    const retry = jest.fn();
    show(<Ui.Failed error={new ApiProblem(409, { title: 'Somebody was faster', detail: 'Kit 014 is out. Pick another kit.' })} onRetry={retry} />);
    expect(screen.getByRole('alert')).toHaveTextContent('Somebody was fasterKit 014 is out. Pick another kit.');
    await user.click(screen.getByRole('button', { name: 'Try again' }));
    expect(retry).toHaveBeenCalled();
  });

  it('never shows the text of an unexpected error', () => {
    expect(problemWords(new Error('undefined is not a function')).text).not.toMatch(/undefined/);
    expect(problemWords(new NoAnswer(null)).title).toBe('The server cannot be reached');
  });
});

describe('StateBadge', () => {
  it.each(['same', 'open', 'different', 'out', 'neutral'] as const)('says %s by a word and by a shape of its own', (state) => {
    const { container } = show(<Ui.StateBadge state={state} label={`is ${state}`} />);
    expect(screen.getByText(`is ${state}`)).toBeInTheDocument();
    expect(container.querySelectorAll('svg path').length).toBeGreaterThan(0);
  });
});

describe('Figure', () => {
  it('is named when it stands alone and silent beside a name', () => {
    const { rerender, container } = show(<Ui.Figure parameters={null} label="Stone B" />);
    expect(screen.getByRole('img', { name: 'Stone B' })).toBeInTheDocument();
    expect(container.querySelector('canvas')).toBeNull();
    rerender(<></>);
  });
});

describe('RiSgPlot', () => {
  it('says its numbers to a screen reader and shows them as a table', async () => {
    const user = userEvent.setup();
    show(
      <RiSgPlot
        record={{ ri: { value: 1.62, u: 0.006 }, sg: { value: 3.56, u: 0.02 } }}
        reading={{ ri: { value: 1.52, u: 0.006 } }}
        species={[{ name: 'glass', ri: [1.47, 1.7], sg: [2.3, 4.5] }]}
      />,
    );
    expect(screen.getByRole('img').getAttribute('aria-label')).toContain('record: RI 1.620 ± 0.006, SG 3.56 ± 0.02');
    await user.click(screen.getByRole('button', { name: 'Show as a table' }));
    expect(screen.getByRole('row', { name: 'reading 1.520 ± 0.006 –' })).toBeInTheDocument();
    expect(screen.getByRole('row', { name: 'glass 1.470–1.700 2.30–4.50' })).toBeInTheDocument();
  });
});

describe('PageFrame', () => {
  it('names the tab and moves the focus to the heading after a navigation', () => {
    place.pathname = '/kits';
    const first = show(<Ui.PageFrame title="Kits" />);
    expect(document.title).toBe('Kits · Trayward');
    first.unmount();
    place.pathname = '/kits/7';
    show(<Ui.PageFrame title="Kit 014 is on the shelf" />);
    const heading = screen.getByRole('heading', { level: 1 });
    expect(heading).toHaveFocus();
    expect(screen.getByRole('main')).toContainElement(heading);
  });
});

describe('Announcements', () => {
  it('are said politely and go away by themselves', () => {
    jest.useFakeTimers();
    show(<Speaker />);
    act(() => screen.getByRole('button').click());
    expect(screen.getByRole('status')).toHaveTextContent('Jar C seen');
    act(() => jest.advanceTimersByTime(6000));
    expect(screen.getByRole('status')).toBeEmptyDOMElement();
    jest.useRealTimers();
  });
});

function Speaker() {
  const announce = Ui.useAnnounce();
  return <Ui.Button label="Scan" onPress={() => announce('Jar C seen')} />;
}
