import type { LoanView } from '@shared/api/loans';
import { Card, Failed, formatMoment, LinkButton, Loading, Notice, PageFrame, Row, Stack, Text, TimeBar } from '@/components/ui';
import { StatementCard } from '@/components/deposits/StatementCard';
import { DepositCard } from './DepositCard';
import { JarList } from './JarList';
import { OutcomeCard } from './OutcomeCard';
import { TakeOut } from './TakeOut';
import { useClock } from './useClock';
import { daysLeft, loanLead, loanTitle } from './words';

interface BorrowedLoanProps {
  loan: LoanView;
  /** `done` or `left` just after the payment page. */
  payment: string | null;
  checking: boolean;
  checkError: unknown;
}

/** A loan as its borrower sees it: blind, with the one thing to do next. */
export function BorrowedLoan({ loan, payment, checking, checkError }: BorrowedLoanProps) {
  const clock = useClock();
  if (loan.state === 'reserved' && checking) {
    return (
      <PageFrame title="Looking for your payment" eyebrow={`Kit ${loan.kitNumber}`}>
        <Loading label="Asking the payment service" />
      </PageFrame>
    );
  }
  return (
    <PageFrame
      title={loanTitle(loan, clock)}
      eyebrow={loan.neutralTitle}
      lead={loanLead(loan)}
      back={{ label: 'My loans', to: '/loans' }}
      {...(loan.state === 'out' ? { footer: <LinkButton kind="primary" label="Return kit" to={`/loans/${loan.id}/return`} /> } : {})}
    >
      {checkError ? <Failed error={checkError} title="Your payment could not be looked up" /> : null}
      {loan.state === 'reserved' && payment === 'left' ? <Notice kind="info" title="Not paid yet">You came back without paying. Nothing is held or charged; pay now, or cancel to free the kit.</Notice> : null}
      {loan.state === 'out' && payment === 'done' ? <Notice kind="done" title="All set" live>The deposit is in place and the kit is yours. A receipt is on its way by e-mail.</Notice> : null}
      {loan.state === 'reserved' ? <TakeOut loan={loan} /> : <AfterTakeOut loan={loan} />}
    </PageFrame>
  );
}

function AfterTakeOut({ loan }: { loan: LoanView }) {
  return (
    <Stack gap="lg">
      {loan.state === 'out' && loan.outAt ? <TimeCard loan={loan} outAt={loan.outAt} /> : null}
      {loan.outcome ? <OutcomeCard loan={loan} outcome={loan.outcome} /> : null}
      {loan.state === 'cancelled' ? <LinkButton label="Scan a kit" to="/scan" /> : <DepositCard deposit={loan.deposit} />}
      {loan.state === 'cancelled' ? null : <JarList loan={loan} />}
      {loan.deposit.state === 'none' || loan.state === 'cancelled' ? null : <StatementCard loanId={loan.id} />}
    </Stack>
  );
}

function TimeCard({ loan, outAt }: { loan: LoanView; outAt: string }) {
  const clock = useClock();
  const from = Date.parse(outAt);
  const passed = Math.min(1, Math.max(0, (clock.now.getTime() - from) / Math.max(1, Date.parse(loan.dueAt) - from)));
  const left = daysLeft(loan.dueAt, clock.now);
  return (
    <Card>
      <Row justify="space-between" align="baseline" wrap>
        <Text strong>{left}</Text>
        <Text size="quiet">{`due ${formatMoment(loan.dueAt, clock)}`}</Text>
      </Row>
      <TimeBar passed={passed} label={left} />
      <Text size="quiet" tone="soft">{`out since ${formatMoment(outAt, clock)}`}</Text>
    </Card>
  );
}
