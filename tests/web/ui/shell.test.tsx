import { screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import type { Role } from '@shared/api/common';
import { SessionStore } from '@/components/api';
import { SignInScreen } from '@/components/session/SignInScreen';
import { RequireRole, RequireSession, SchoolShell } from '@/components/shell';
import { initialsOf } from '@/components/shell/initials';
import { homeFor, isWithin, phoneTabsFor, places, placesFor } from '@/components/shell/places';
import { safeNext, signInAddress } from '@/components/shell/signInAddress';
import * as Ui from '@/components/ui';
import { place, redirected } from './expoRouter';
import { installBrowserParts, setWidth, show, signedInStore } from './harness';

jest.mock('expo-router', () => jest.requireActual<typeof import('./expoRouter')>('./expoRouter'));

beforeAll(installBrowserParts);
beforeEach(() => {
  localStorage.clear();
  jest.clearAllMocks();
  place.pathname = '/desk';
  place.params = {};
  setWidth(390);
});

const labels = (list: readonly { label: string }[]) => list.map((each) => each.label);
const combinations: Role[][] = [['student'], ['instructor'], ['admin'], ['student', 'instructor'], ['instructor', 'admin'], ['student', 'admin'], ['student', 'instructor', 'admin'], []];

describe('the tabs of a phone', () => {
  it.each(combinations.map((roles) => [roles]))('are at most four for %j, and nothing is lost', (roles) => {
    const { tabs, more } = phoneTabsFor(roles);
    expect(tabs.length + (more.length > 0 ? 1 : 0)).toBeLessThanOrEqual(4);
    const reachable = new Set([...tabs, ...more].map((each) => each.id));
    // An instructor reaches the labels from the kits.
    expect(placesFor(roles).filter((each) => !reachable.has(each.id) && each.id !== 'labels')).toEqual([]);
  });

  it('are those of the role', () => {
    expect(labels(phoneTabsFor(['student']).tabs)).toEqual(['Borrow', 'Scan', 'My loans']);
    expect(labels(phoneTabsFor(['instructor']).tabs)).toEqual(['Bench', 'Scan', 'Kits', 'Instruments']);
    expect(labels(phoneTabsFor(['admin']).tabs)).toEqual(['Desk', 'Scan', 'Kits']);
    expect(labels(phoneTabsFor(['admin']).more)).toContain('Money');
  });

  it('give each of several roles its first place', () => {
    expect(labels(phoneTabsFor(['student', 'instructor']).tabs)).toEqual(['Bench', 'Borrow', 'Scan']);
  });

  it('offer nobody a place that is not for one of their roles', () => {
    for (const roles of combinations) {
      for (const each of placesFor(roles)) expect(each.roles.some((role) => roles.includes(role))).toBe(true);
    }
  });

  it('are links of which one is the present page', () => {
    show(<SchoolShell>{null}</SchoolShell>);
    const links = within(screen.getByRole('navigation', { name: 'Places' })).getAllByRole('link');
    expect(links.map((link) => link.getAttribute('href'))).toEqual(['/desk', '/scan', '/kits']);
    expect(links.filter((link) => link.getAttribute('aria-current') === 'page')).toHaveLength(1);
  });

  it('become a rail with every place when the window is wide', () => {
    setWidth(1280);
    show(<SchoolShell>{null}</SchoolShell>);
    const links = within(screen.getByRole('navigation', { name: 'Places' })).getAllByRole('link');
    expect(links.map((link) => link.textContent)).toEqual(labels(placesFor(['admin'])));
  });
});

describe('a place', () => {
  it('holds its own pages, and Kits those of stones', () => {
    expect(isWithin(places.kits, '/kits/7')).toBe(true);
    expect(isWithin(places.kits, '/stones/3')).toBe(true);
    expect(isWithin(places.kits, '/kitsch')).toBe(false);
  });

  it('is where the day starts', () => {
    expect(homeFor(['student', 'admin'])).toBe('/desk');
    expect(homeFor(['student'])).toBe('/borrow');
    expect(homeFor([])).toBeNull();
  });
});

describe('the account menu', () => {
  it('names person, roles and school, changes the school and the look', async () => {
    const user = userEvent.setup();
    const store = new SessionStore();
    store.signIn({
      accessToken: 't',
      expiresAt: new Date(Date.now() + 900_000).toISOString(),
      account: { id: 'a', name: 'Ada Portell', email: 'ada@portellery.example' },
      memberships: [{ schoolId: 's1', schoolName: 'Portellery', roles: ['admin'] }, { schoolId: 's2', schoolName: 'Saltpan', roles: ['student'] }],
    });
    show(<SchoolShell>{null}</SchoolShell>, { store });
    await user.click(screen.getByRole('button', { name: 'Your account: Ada Portell' }));
    const dialog = screen.getByRole('dialog', { name: 'Ada Portell' });
    expect(dialog).toHaveTextContent('admin at Portellery');
    await user.click(within(dialog).getByRole('radio', { name: 'Darkroom' }));
    expect(localStorage.getItem('trayward.scheme')).toBe('dark');
    await user.click(within(dialog).getByRole('radio', { name: /Saltpan/ }));
    expect(store.get()).toMatchObject({ schoolId: 's2' });
  });
});

describe('guards', () => {
  it('send the signed-out to the sign-in page, and back afterwards', () => {
    const store = new SessionStore();
    store.signOut();
    place.pathname = '/kits/7';
    show(<RequireSession><Ui.Text>secret</Ui.Text></RequireSession>, { store });
    expect(screen.queryByText('secret')).toBeNull();
    expect(redirected).toHaveBeenCalledWith('/sign-in?next=%2Fkits%2F7');
  });

  it('wait while the session is being restored', () => {
    show(<RequireSession><Ui.Text>secret</Ui.Text></RequireSession>, { store: new SessionStore() });
    expect(screen.queryByText('secret')).toBeNull();
    expect(screen.getByRole('status', { name: 'Opening your school' })).toBeInTheDocument();
    expect(redirected).not.toHaveBeenCalled();
  });

  it('tell other roles whose page it is', () => {
    show(<RequireRole roles={['admin']}><Ui.Text>secret</Ui.Text></RequireRole>, { store: signedInStore(['student']) });
    expect(screen.queryByText('secret')).toBeNull();
    expect(screen.getByRole('heading', { level: 1 })).toHaveTextContent('This page is not for your role');
    expect(screen.getByRole('link', { name: 'Go to your start page' })).toHaveAttribute('href', '/borrow');
  });

  it.each([['//evil.example', null], ['/\\evil.example', null], ['https://evil.example', null], [undefined, null], ['/kits/7', '/kits/7']])('follow %p only inside the app', (next, to) => {
    expect(safeNext(next)).toBe(to);
  });

  it('leave the bare address out of the way back', () => {
    expect(signInAddress('/')).toBe('/sign-in');
  });
});

describe('the sign-in page', () => {
  function signedOut(ended = false): SessionStore {
    const store = new SessionStore();
    store.signOut(ended);
    return store;
  }

  it('asks for what is missing before it asks the server', async () => {
    const user = userEvent.setup();
    globalThis.fetch = jest.fn();
    show(<SignInScreen />, { store: signedOut() });
    await user.click(screen.getByRole('button', { name: 'Sign in' }));
    expect(screen.getByLabelText('E-mail')).toHaveAccessibleDescription('Enter your e-mail address.');
    expect(globalThis.fetch).not.toHaveBeenCalled();
  });

  it('signs in and leads on to where one was going', async () => {
    const user = userEvent.setup();
    place.params = { next: '/kits/7' };
    const store = signedOut();
    const answer = {
      accessToken: 't', expiresAt: new Date(Date.now() + 900_000).toISOString(), account: { id: 'a', name: 'Ada', email: 'a@b.example' },
      memberships: [{ schoolId: 's', schoolName: 'Portellery', roles: ['admin'] }],
    };
    globalThis.fetch = jest.fn(async () => ({ ok: true, status: 200, text: async () => JSON.stringify(answer) })) as jest.Mock;
    show(<SignInScreen />, { store });
    await user.type(screen.getByLabelText('E-mail'), ' a@b.example ');
    await user.type(screen.getByLabelText('Password'), 'crossed-polars{Enter}');
    await screen.findByRole('status');
    expect(JSON.parse(((globalThis.fetch as jest.Mock).mock.calls[0] as [string, RequestInit])[1].body as string)).toEqual({ email: 'a@b.example', password: 'crossed-polars' });
    expect(redirected).toHaveBeenCalledWith('/kits/7');
  });

  it('says the refusal and keeps what was typed', async () => {
    const user = userEvent.setup();
    const refusal = { title: 'That did not match', detail: 'Check both, or choose a new password.', code: 'sign_in_refused' };
    globalThis.fetch = jest.fn(async () => ({ ok: false, status: 401, json: async () => refusal })) as jest.Mock;
    show(<SignInScreen />, { store: signedOut() });
    await user.type(screen.getByLabelText('E-mail'), 'a@b.example');
    await user.type(screen.getByLabelText('Password'), 'wrong{Enter}');
    expect(await screen.findByRole('alert')).toHaveTextContent('Check both, or choose a new password.');
    expect(screen.getByLabelText('E-mail')).toHaveValue('a@b.example');
  });

  it('says so when a session ended by itself', () => {
    show(<SignInScreen />, { store: signedOut(true) });
    expect(screen.getByText('You were signed out')).toBeInTheDocument();
  });
});

it.each([['Ada Portell', 'AP'], ['Ada', 'A'], ['  ', ''], ['Ada M. Byron', 'AB']])('the initials of %p are %p', (name, initials) => {
  expect(initialsOf(name)).toBe(initials);
});
