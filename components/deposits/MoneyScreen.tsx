import type { MoneyView } from '@shared/api/money';
import { useSchoolQuery } from '@/components/api';
import { RequireRole } from '@/components/shell';
import { Card, DataTable, EmptyState, Failed, formatMoment, formatMoney, Loading, Mono, Money, Notice, PageFrame, Row, Stack, Text } from '@/components/ui';
import { depositWords } from '@/components/desk/words';
import { useMoneyQuery } from './queries';

/** Deposits as they stand at the payment service and in the ledger. */
export function MoneyScreen() {
  const money = useMoneyQuery();
  return (
    <RequireRole roles={['admin']}>
      <PageFrame title={money.data ? titleFor(money.data) : 'Money'} documentTitle="Money" width="wide" lead="A deposit stays the student’s until people decide. A hold is on the card; a charge is paid back.">
        {money.isPending ? <Loading label="Adding up" /> : null}
        {money.isError ? <Failed error={money.error} onRetry={() => void money.refetch()} /> : null}
        {money.data ? <MoneyBody view={money.data} /> : null}
      </PageFrame>
    </RequireRole>
  );
}

function titleFor({ heldMinor, chargedMinor, currency }: MoneyView): string {
  const total = heldMinor + chargedMinor;
  return total === 0 ? 'No deposits are held' : `${formatMoney(total, currency)} of students’ deposits`;
}

function MoneyBody({ view }: { view: MoneyView }) {
  return (
    <Stack gap="lg">
      {view.ledgerSumMinor !== 0 ? (
        <Notice kind="error" title="The ledger does not add up">{`Its balances sum to ${formatMoney(view.ledgerSumMinor, view.currency)} instead of nothing. Lend no more on deposit and tell whoever runs the server.`}</Notice>
      ) : null}
      {view.unfinishedSteps > 0 ? (
        <Notice kind="info" title={`${view.unfinishedSteps} step${view.unfinishedSteps === 1 ? '' : 's'} at the payment service not finished`}>They are tried again by themselves. If this stays for hours, look at the payment service.</Notice>
      ) : null}
      <Row gap="lg" wrap align="stretch">
        <Sum label="Held on cards" amountMinor={view.heldMinor} currency={view.currency} />
        <Sum label="Charged, to pay back" amountMinor={view.chargedMinor} currency={view.currency} />
        <Sum label="Kept by the school" amountMinor={view.keptMinor} currency={view.currency} />
      </Row>
      <Deposits view={view} />
    </Stack>
  );
}

function Sum({ label, amountMinor, currency }: { label: string; amountMinor: number; currency: string }) {
  return (
    <Card style={{ flexGrow: 1, flexBasis: 160 }} gap="xs">
      <Text size="quiet" tone="soft">{label}</Text>
      <Money amountMinor={amountMinor} currency={currency} strong />
    </Card>
  );
}

function Deposits({ view }: { view: MoneyView }) {
  const school = useSchoolQuery();
  const timeZone = school.data?.timeZone ?? 'UTC';
  return (
    <Card padded={false} title="Deposits">
      <DataTable
        caption="Deposits"
        rows={view.deposits}
        rowKey={(row) => `${row.loanId}${row.paymentIntentId ?? ''}`}
        rowTo={(row) => `/loans/${row.loanId}`}
        empty={<EmptyState title="None yet">A deposit appears here when a student pays one.</EmptyState>}
        columns={[
          { key: 'kit', header: 'Kit', cell: (row) => <Mono strong>{`Kit ${row.kitNumber}`}</Mono> },
          { key: 'who', header: 'Borrower', cell: (row) => row.borrowerName },
          { key: 'amount', header: 'Deposit', align: 'right', cell: (row) => <Money amountMinor={row.amountMinor} currency={row.currency} /> },
          { key: 'state', header: 'State', cell: (row) => wordFor(row.state) },
          { key: 'until', header: 'Hold lapses', cell: (row) => (row.captureBefore ? formatMoment(row.captureBefore, { timeZone }) : '–') },
          { key: 'object', header: 'Payment object', wideOnly: true, cell: (row) => <Mono size="small">{row.paymentIntentId ?? '–'}</Mono> },
        ]}
      />
    </Card>
  );
}

const wordFor = (state: string): string => Object.entries(depositWords).find(([name]) => name === state)?.[1] ?? state;
