import { Card, EmptyState, Failed, formatMoment, LinkButton, List, ListRow, Loading, Mono, PageFrame, StateBadge } from '@/components/ui';
import { useLoansQuery } from './queries';
import { useClock } from './useClock';
import { loanBadge, loanTitle } from './words';

/** One's own loans, newest first. */
export function MyLoansScreen() {
  const loans = useLoansQuery();
  const clock = useClock();
  const items = loans.data?.items ?? [];
  const open = items.find((loan) => loan.state !== 'settled' && loan.state !== 'cancelled');
  return (
    <PageFrame title={open ? loanTitle(open, clock) : 'You have no kit out'} documentTitle="My loans" footer={open ? <LinkButton kind="primary" label={`Open kit ${open.kitNumber}`} to={`/loans/${open.id}`} /> : <LinkButton kind="primary" label="Scan a kit" to="/scan" />}>
      {loans.isPending ? <Loading label="Fetching your loans" /> : null}
      {loans.isError ? <Failed error={loans.error} onRetry={() => void loans.refetch()} /> : null}
      {loans.isSuccess && items.length === 0 ? <EmptyState title="Nothing borrowed yet">Scan the label of a kit to take it out.</EmptyState> : null}
      {items.length > 0 ? (
        <Card padded={false}>
          <List label="Your loans">
            {items.map((loan, index) => (
              <ListRow
                key={loan.id}
                inset
                rule={index < items.length - 1}
                to={`/loans/${loan.id}`}
                before={<Mono strong>{loan.kitNumber}</Mono>}
                title={loan.neutralTitle}
                detail={`due ${formatMoment(loan.dueAt, clock)}`}
                after={<StateBadge {...loanBadge(loan)} />}
              />
            ))}
          </List>
        </Card>
      ) : null}
    </PageFrame>
  );
}
