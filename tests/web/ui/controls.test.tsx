import { screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import * as Ui from '@/components/ui';
import { router } from './expoRouter';
import { installBrowserParts, show } from './harness';

jest.mock('expo-router', () => jest.requireActual<typeof import('./expoRouter')>('./expoRouter'));

beforeAll(installBrowserParts);
beforeEach(() => jest.clearAllMocks());

describe('Button', () => {
  it('acts on a click, on Enter and on the space bar', async () => {
    const user = userEvent.setup();
    const press = jest.fn();
    show(<Ui.Button label="Return kit" onPress={press} />);
    await user.click(screen.getByRole('button', { name: 'Return kit' }));
    await user.keyboard('{Enter}');
    await user.keyboard(' ');
    expect(press).toHaveBeenCalledTimes(3);
  });

  it('does nothing while busy, keeps the focus and says so', async () => {
    const user = userEvent.setup();
    const press = jest.fn();
    show(<Ui.Button label="Return kit" busy onPress={press} />);
    const button = screen.getByRole('button', { name: 'Return kit' });
    await user.click(button);
    expect(press).not.toHaveBeenCalled();
    expect(button).toHaveAttribute('aria-busy', 'true');
    expect(button).toHaveFocus();
  });

  it('cannot be pressed while disabled', () => {
    const press = jest.fn();
    show(<Ui.Button label="Return kit" disabled onPress={press} />);
    screen.getByRole('button', { name: 'Return kit' }).click();
    expect(press).not.toHaveBeenCalled();
    expect(screen.getByRole('button')).toBeDisabled();
  });

  it('is at least 44 px high in every kind', () => {
    show(<>{(['primary', 'secondary', 'danger', 'quiet'] as const).map((kind) => <Ui.Button key={kind} kind={kind} label={kind} onPress={() => undefined} />)}</>);
    for (const button of screen.getAllByRole('button')) expect(parseFloat(getComputedStyle(button).minHeight)).toBeGreaterThanOrEqual(44);
  });
});

describe('Links', () => {
  it('are real anchors that stay in the app on a plain click', async () => {
    const user = userEvent.setup();
    show(<Ui.LinkButton label="Open the custody record" to="/kits/7" />);
    const link = screen.getByRole('link', { name: 'Open the custody record' });
    expect(link.tagName).toBe('A');
    expect(link).toHaveAttribute('href', '/kits/7');
    await user.click(link);
    expect(router.push).toHaveBeenCalledWith('/kits/7');
  });

  it('follow Enter', async () => {
    const user = userEvent.setup();
    show(<Ui.Link label="Kits" to="/kits" />);
    await user.tab();
    await user.keyboard('{Enter}');
    expect(router.push).toHaveBeenCalledTimes(1);
  });

  it('leave a click with Control to the browser', async () => {
    const user = userEvent.setup();
    // jsdom cannot follow a link; what matters is that the app does not.
    document.addEventListener('click', (event) => event.preventDefault(), { once: true });
    show(<Ui.Link label="Kits" to="/kits" />);
    await user.keyboard('{Control>}');
    await user.click(screen.getByRole('link'));
    expect(router.push).not.toHaveBeenCalled();
  });
});

describe('Fields', () => {
  it('tie label, hint and error to the input', () => {
    show(<Ui.TextField label="Marks" hint="Chips, bubbles." error="Say what you see." required value="" onChange={() => undefined} />);
    const input = screen.getByRole('textbox', { name: 'Marks' });
    expect(input).toHaveAccessibleDescription('Chips, bubbles. Say what you see.');
    expect(input).toBeInvalid();
    expect(input).toBeRequired();
  });

  it('take a comma for a point and name the unit', async () => {
    const user = userEvent.setup();
    show(<NumberBox />);
    await user.type(screen.getByRole('textbox', { name: 'Weight ct' }), '1,5 ct!');
    expect(screen.getByText('= 1.5')).toBeInTheDocument();
  });

  it.each([['1,566', 1.566], ['.5', 0.5], ['12', 12], ['1.', 1], ['', null], ['1.2.3', null], ['-', null], ['1e5', null]])('read %p as %p', (text, value) => {
    expect(Ui.parseNumber(text)).toBe(value);
  });

  it('send the form on Enter and by its button, once each', async () => {
    const user = userEvent.setup();
    const send = jest.fn();
    show(
      <Ui.Form label="Code" onSubmit={send}>
        <Ui.TextField label="Code" value="x" onChange={() => undefined} />
        <Ui.TextField label="Note" value="" onChange={() => undefined} />
        <Ui.Button label="Find" submits />
      </Ui.Form>,
    );
    await user.type(screen.getByLabelText('Code', { selector: 'input' }), '{Enter}');
    expect(send).toHaveBeenCalledTimes(1);
    await user.click(screen.getByRole('button', { name: 'Find' }));
    expect(send).toHaveBeenCalledTimes(2);
  });

  it('are real radio buttons when few words are chosen from', async () => {
    const user = userEvent.setup();
    const choose = jest.fn();
    show(<Ui.SegmentedField label="Polariscope" value="DR" options={[{ value: 'SR', label: 'SR' }, { value: 'DR', label: 'DR' }]} onChange={choose} />);
    expect(within(screen.getByRole('group', { name: 'Polariscope' })).getByRole('radio', { name: 'DR' })).toBeChecked();
    await user.click(screen.getByRole('radio', { name: 'SR' }));
    expect(choose).toHaveBeenCalledWith('SR');
  });
});

function NumberBox() {
  const [text, setText] = useState('');
  return (
    <>
      <Ui.NumberField label="Weight" unit="ct" value={text} onChange={setText} />
      <Ui.Text>{`= ${Ui.parseNumber(text) ?? 'none'}`}</Ui.Text>
    </>
  );
}

describe('Keypad', () => {
  it('takes its own keys and the keyboard alike, and one point only', async () => {
    const user = userEvent.setup();
    const enter = jest.fn();
    show(<PadBox onEnter={enter} />);
    for (const name of ['1', 'Point', '5']) await user.click(screen.getByRole('button', { name }));
    const box = screen.getByRole('textbox', { name: 'Weight ct' });
    expect(box).toHaveValue('1.5');
    await user.type(box, '6.7x{Enter}');
    expect(box).toHaveValue('1.567');
    expect(enter).toHaveBeenCalledTimes(1);
    await user.click(screen.getByRole('button', { name: 'Erase the last digit' }));
    expect(box).toHaveValue('1.56');
  });

  it('keeps the phone’s own keyboard away', () => {
    show(<PadBox onEnter={() => undefined} />);
    expect(screen.getByRole('textbox')).toHaveAttribute('inputmode', 'none');
  });
});

function PadBox({ onEnter }: { onEnter: () => void }) {
  const [value, setValue] = useState('');
  return <Ui.Keypad label="Weight" unit="ct" value={value} onChange={setValue} onEnter={onEnter} enterLabel="Next" />;
}

describe('Tabs', () => {
  it('move with the arrows, round the ends', async () => {
    const user = userEvent.setup();
    show(<TabsBox />);
    await user.click(screen.getByRole('tab', { name: 'All, 3' }));
    await user.keyboard('{ArrowLeft}');
    expect(screen.getByRole('tab', { name: 'Late' })).toHaveAttribute('aria-selected', 'true');
    expect(screen.getByRole('tab', { name: 'Late' })).toHaveFocus();
    expect(screen.getByRole('tabpanel')).toHaveTextContent('view late');
  });
});

function TabsBox() {
  const [tab, setTab] = useState<'all' | 'late'>('all');
  return (
    <Ui.Tabs label="Loans" value={tab} onChange={setTab} tabs={[{ value: 'all', label: 'All', count: 3 }, { value: 'late', label: 'Late' }]}>
      <Ui.Text>{`view ${tab}`}</Ui.Text>
    </Ui.Tabs>
  );
}

describe('Dialog', () => {
  it('is a named modal that closes by its button', async () => {
    const user = userEvent.setup();
    const close = jest.fn();
    show(
      <Ui.Dialog open onClose={close} title="Stop this loan?">
        <Ui.Text>The deposit is released.</Ui.Text>
      </Ui.Dialog>,
    );
    expect(screen.getByRole('dialog', { name: 'Stop this loan?' })).toBeVisible();
    await user.click(screen.getByRole('button', { name: 'Close' }));
    expect(close).toHaveBeenCalled();
  });
});
