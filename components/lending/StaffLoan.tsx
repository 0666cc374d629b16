import type { StaffLoanView } from '@shared/api/loans';
import { useSession } from '@/components/api';
import { depositWords } from '@/components/desk/words';
import { SettlementCard } from '@/components/deposits/SettlementCard';
import { StatementCard } from '@/components/deposits/StatementCard';
import { Card, formatMoment, LinkButton, Money, PageFrame, Row, Stack, StateBadge, Text } from '@/components/ui';
import { JarList } from './JarList';
import { TakeOut } from './TakeOut';
import { useClock } from './useClock';
import { loanBadge } from './words';

/** Somebody else's loan, for staff: where it stands, its money, its chain of events, and what can be done for the borrower. */
export function StaffLoan({ view }: { view: StaffLoanView }) {
  const { hasRole } = useSession();
  return (
    <PageFrame
      title={`Kit ${view.kitNumber}, ${view.borrower.name}`}
      eyebrow={view.title}
      back={{ label: hasRole('admin') ? 'Desk' : 'Bench', to: hasRole('admin') ? '/desk' : '/bench' }}
      aside={<CustodyCard view={view} />}
      asideLabel="Custody"
    >
      <StaffLoanBody view={view} />
    </PageFrame>
  );
}

/** What staff see and do about one loan; the desk shows the same beside its list. */
export function StaffLoanBody({ view }: { view: StaffLoanView }) {
  const { hasRole } = useSession();
  const { loan } = view;
  const atBench = loan.state === 'returned' || loan.state === 'checking' || loan.state === 'set_aside';
  return (
    <Stack gap="lg">
      <StateBadge {...loanBadge(loan)} />
      <Facts view={view} />
      {loan.state === 'reserved' ? <TakeOut loan={loan} /> : null}
      {loan.state === 'out' ? <LinkButton kind="primary" label={`Return it for ${view.borrower.name}`} to={`/loans/${loan.id}/return`} /> : null}
      {atBench ? <LinkButton label="Open the bench check" to={`/bench/${loan.id}`} /> : null}
      {hasRole('admin') && (loan.state === 'set_aside' || loan.outcome !== null) ? <SettlementCard loanId={loan.id} /> : null}
      <JarList loan={loan} />
      {hasRole('admin') && loan.deposit.state !== 'none' ? <StatementCard loanId={loan.id} /> : null}
    </Stack>
  );
}

function Facts({ view }: { view: StaffLoanView }) {
  const clock = useClock();
  const { loan } = view;
  const facts: [string, string | null][] = [
    ['Out', loan.outAt], ['Due', loan.dueAt], ['Brought back', loan.returnedAt], ['Settled', loan.settledAt],
  ];
  return (
    <Card>
      {facts.flatMap(([label, at]) => (at === null ? [] : [
        <Row key={label} justify="space-between">
          <Text tone="soft">{label}</Text>
          <Text>{formatMoment(at, clock)}</Text>
        </Row>,
      ]))}
      <Row justify="space-between">
        <Text tone="soft">{`Deposit, ${depositWords[view.depositState]}`}</Text>
        <Money amountMinor={view.depositMinor} currency={view.currency} />
      </Row>
      <Text size="quiet" tone="soft">{loan.deposit.explanation}</Text>
    </Card>
  );
}

function CustodyCard({ view }: { view: StaffLoanView }) {
  const clock = useClock();
  return (
    <Card title="Custody">
      {view.custody.map((event) => (
        <Stack key={event.id} gap="xxs">
          <Text>{event.slot ? `Jar ${event.slot}: ${event.text}` : event.text}</Text>
          <Text size="quiet" tone="soft">{formatMoment(event.at, clock)}</Text>
        </Stack>
      ))}
      {view.custody.length === 0 ? <Text tone="soft">Nothing has happened yet.</Text> : null}
    </Card>
  );
}
