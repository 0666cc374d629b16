import { useState } from 'react';
import { View } from 'react-native';
import { useTheme } from '@/components/theme';
import * as Ui from '@/components/ui';
import { FigureOfSpecies } from '@/components/ui/FigureOfSpecies';
import { RiSgPlot } from '@/components/ui/RiSgPlot';

/** Every primitive on one page, for the accessibility run and for looking at. Not a route: it is never shipped. */
export function Gallery() {
  return (
    <Ui.PageFrame
      title="Kit 014 is yours until Friday"
      eyebrow="Second-year optics"
      lead="Every stone has a jar; scan each of them."
      back={{ label: 'Kits', to: '/desk' }}
      width="wide"
      footer={<Ui.Button label="Return kit" onPress={nothing} />}
      aside={<Aside />}
      asideLabel="Kit 014"
    >
      <Loan />
      <States />
      <Entry />
      <Rows />
      <Pictures />
    </Ui.PageFrame>
  );
}

function nothing(): void {}

function Loan() {
  const announce = Ui.useAnnounce();
  return (
    <>
      <Ui.Card title="5 days left">
        <Ui.TimeBar passed={0.62} label="5 of 9 days have passed" />
        <Ui.Row justify="space-between">
          <Ui.Mono size="quiet" tone="soft">out 2 Dec</Ui.Mono>
          <Ui.Mono size="quiet" tone="soft">due Fri 11 Dec, 17:00</Ui.Mono>
        </Ui.Row>
        <Ui.Row wrap>
          <Ui.Button label="Say something" onPress={() => announce('Jar C seen')} />
          <Ui.Button kind="secondary" label="Keep longer" onPress={nothing} />
          <Ui.Button kind="danger" label="Stop the loan" onPress={nothing} />
          <Ui.Button kind="quiet" label="Not now" onPress={nothing} />
          <Ui.Button label="Sending" busy onPress={nothing} />
          <Ui.LinkButton label="Open custody" to="/desk" />
        </Ui.Row>
      </Ui.Card>
      <Ui.Card edge="different" gap="sm">
        <Ui.StateBadge state="different" label="Different stone" />
        <Ui.Heading level={2}>Extremely strong support for another stone. Glass fits best.</Ui.Heading>
        <Ui.Row justify="space-between">
          <Ui.Text>Deposit</Ui.Text>
          <Ui.Money amountMinor={6000} currency="EUR" strong />
        </Ui.Row>
        <Ui.Row justify="space-between">
          <Ui.Text>Weight</Ui.Text>
          <Ui.Reading value={1.5661} u={0.0042} unit="ct" />
        </Ui.Row>
        <Ui.CodeText code="K7QF2M9XA0TB" />
        <RiSgPlot
          record={{ ri: { value: 1.62, u: 0.006 }, sg: { value: 3.56, u: 0.02 } }}
          reading={{ ri: { value: 1.52, u: 0.006 }, sg: { value: 2.5, u: 0.02 } }}
          species={[{ name: 'glass', ri: [1.47, 1.7], sg: [2.3, 4.5] }, { name: 'topaz', ri: [1.606, 1.624], sg: [3.5, 3.6] }]}
        />
      </Ui.Card>
    </>
  );
}

function States() {
  return (
    <Ui.Stack>
      <Ui.Row wrap>
        <Ui.StateBadge state="same" label="same" />
        <Ui.StateBadge state="open" label="bench check" />
        <Ui.StateBadge state="different" label="stone C differs" />
        <Ui.StateBadge state="out" label="out" />
        <Ui.StateBadge state="neutral" label="retired" />
      </Ui.Row>
      <Ui.Notice title="Good to know">Readings are never changed.</Ui.Notice>
      <Ui.Notice kind="caution" title="Contact liquid">Wear gloves and keep the lid on; it is toxic and marks soft stones. Follow your lab’s own rules.</Ui.Notice>
      <Ui.Notice kind="done" title="Deposit paid back">All six stones are the ones that went out.</Ui.Notice>
      <Ui.Failed error={new Error('x')} onRetry={nothing} />
      <Ui.Loading label="Fetching the kit" />
      <Ui.EmptyState title="No kit is out" action={<Ui.LinkButton label="See the kits" to="/desk" />}>
        When somebody takes one out, it shows here.
      </Ui.EmptyState>
    </Ui.Stack>
  );
}

function Entry() {
  const [weight, setWeight] = useState('1.5');
  const [species, setSpecies] = useState<'topaz' | 'glass' | ''>('');
  const [reaction, setReaction] = useState<'SR' | 'DR' | 'ADR' | 'AGG'>('DR');
  const [size, setSize] = useState<'a4' | 'letter'>('a4');
  const [agreed, setAgreed] = useState(false);
  const [open, setOpen] = useState(false);
  return (
    <Ui.Card title="Enter a reading">
      <Ui.Form label="Reading" onSubmit={nothing}>
        <Ui.TextField label="Marks" value="" onChange={nothing} optional hint="Chips, bubbles, a scratch on the back." lines={3} />
        <Ui.NumberField label="Weight" unit="ct" value={weight} onChange={setWeight} error="A weight is more than 0 ct." />
        <Ui.SelectField label="Species" value={species} onChange={setSpecies} options={[{ value: 'topaz', label: 'Topaz' }, { value: 'glass', label: 'Glass' }]} />
        <Ui.SegmentedField label="Polariscope" value={reaction} onChange={setReaction} options={(['SR', 'DR', 'ADR', 'AGG'] as const).map((value) => ({ value, label: value }))} />
        <Ui.RadioField label="Paper" value={size} onChange={setSize} options={[{ value: 'a4', label: 'A4', hint: '210 × 297 mm' }, { value: 'letter', label: 'Letter' }]} />
        <Ui.CheckboxField label="I have read the terms" checked={agreed} onChange={setAgreed} />
        <Ui.Button label="Save" submits />
      </Ui.Form>
      <Ui.Button kind="secondary" label="Open a dialog" onPress={() => setOpen(true)} />
      <Ui.Dialog open={open} onClose={() => setOpen(false)} title="Stop this loan?" action={<Ui.Button kind="danger" label="Stop the loan" onPress={nothing} />}>
        <Ui.Text>The kit goes back on the shelf and the deposit is released.</Ui.Text>
      </Ui.Dialog>
      <Ui.Keypad label="Length" unit="mm" value={weight} onChange={setWeight} onEnter={nothing} enterLabel="Next: width" hint="with caliper 2" />
    </Ui.Card>
  );
}

const loans = [
  { id: '1', kit: '014', borrower: '2nd-year optics, seat 6', state: 'different', words: 'stone C differs', due: 'today', deposit: 6000 },
  { id: '2', kit: '003', borrower: 'Evening class, seat 2', state: 'open', words: 'bench check', due: 'today', deposit: 6000 },
  { id: '3', kit: '021', borrower: '2nd-year optics, seat 1', state: 'out', words: 'out', due: '2 days late', deposit: 8500 },
] as const;

function Rows() {
  const [tab, setTab] = useState<'all' | 'late'>('all');
  return (
    <Ui.Tabs label="Loans" value={tab} onChange={setTab} tabs={[{ value: 'all', label: 'All', count: 3 }, { value: 'late', label: 'Late', count: 1 }]}>
      <Ui.DataTable
        caption="Loans of today"
        rows={loans}
        rowKey={(loan) => loan.id}
        rowTo={() => '/desk'}
        columns={[
          { key: 'kit', header: 'Kit', cell: (loan) => <Ui.Mono strong>{loan.kit}</Ui.Mono> },
          { key: 'with', header: 'With', cell: (loan) => loan.borrower },
          { key: 'state', header: 'State', cell: (loan) => <Ui.StateBadge state={loan.state} label={loan.words} /> },
          { key: 'due', header: 'Due', cell: (loan) => loan.due },
          { key: 'deposit', header: 'Deposit', align: 'right', cell: (loan) => <Ui.Money amountMinor={loan.deposit} currency="EUR" /> },
        ]}
      />
    </Ui.Tabs>
  );
}

function Pictures() {
  const { colors } = useTheme();
  const species = ['aquamarine', 'amethyst', 'tourmaline', 'topaz', 'peridot', 'almandine', 'synthetic-spinel', 'jadeite', 'spinel', 'moonstone'];
  return (
    <Ui.Card title="Figures">
      <Ui.InterferenceStrip height={12} />
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: 12, borderColor: colors.rule }}>
        <Ui.Figure parameters={null} size={96} label="Stone A, not yet answered" />
        {species.map((id) => (
          <FigureOfSpecies key={id} species={id} size={96} label={`Figure of ${id}`} />
        ))}
      </View>
    </Ui.Card>
  );
}

function Aside() {
  return (
    <>
      <Ui.Heading level={2} look="heading">Optic-figure set</Ui.Heading>
      <Ui.List label="Stones of kit 014">
        {(['tourmaline', 'amethyst', 'topaz', 'synthetic-spinel'] as const).map((id, index) => (
          <Ui.ListRow
            key={id}
            title={`${'ABCD'[index]} ${id}`}
            detail={<Ui.Mono size="quiet" tone="soft">1.63 · 3.06 · 2.563 ct</Ui.Mono>}
            before={<FigureOfSpecies species={id} size={48} />}
            after={<Ui.StateBadge state={index === 2 ? 'different' : 'same'} label={index === 2 ? 'differs' : 'same'} />}
            to="/desk"
          />
        ))}
      </Ui.List>
      <Ui.Link label="Open the custody record" to="/desk" />
    </>
  );
}
