import type { BenchRow } from '@shared/api/bench';
import { useSchoolQuery } from '@/components/api';
import { RequireRole } from '@/components/shell';
import { Card, EmptyState, Failed, formatMoment, List, ListRow, Loading, Mono, PageFrame, StateBadge } from '@/components/ui';
import { useBenchListQuery } from './queries';
import { rowBadge } from './words';

/** What waits at the bench. */
export function BenchListScreen() {
  const bench = useBenchListQuery();
  const rows = bench.data?.items ?? [];
  return (
    <RequireRole roles={['instructor', 'admin']}>
      <PageFrame title={titleFor(rows, bench.isSuccess)} documentTitle="Bench" lead="Each check begins with a scan of the kit and its jars. Readings are taken before the record opens.">
        {bench.isPending ? <Loading label="Looking into the return box" /> : null}
        {bench.isError ? <Failed error={bench.error} onRetry={() => void bench.refetch()} /> : null}
        {bench.isSuccess && rows.length === 0 ? (
          <EmptyState title="The return box is empty">Kits appear here when a student brings them back. A kit you borrowed yourself is checked by a colleague and never shows here.</EmptyState>
        ) : null}
        {rows.length > 0 ? <BenchRows rows={rows} /> : null}
      </PageFrame>
    </RequireRole>
  );
}

function titleFor(rows: readonly BenchRow[], known: boolean): string {
  if (!known) return 'The bench';
  if (rows.length === 0) return 'Nothing to check';
  return rows.length === 1 ? 'One kit to check' : `${rows.length} kits to check`;
}

function BenchRows({ rows }: { rows: readonly BenchRow[] }) {
  const school = useSchoolQuery();
  const timeZone = school.data?.timeZone;
  return (
    <Card padded={false}>
      <List label="Kits at the bench">
        {rows.map((row, index) => (
          <ListRow
            key={row.loanId}
            inset
            rule={index < rows.length - 1}
            to={`/bench/${row.loanId}`}
            before={<Mono strong>{row.kitNumber}</Mono>}
            title={row.neutralTitle}
            detail={`${row.stoneCount} stones, back ${timeZone ? formatMoment(row.returnedAt, { timeZone }) : ''}`}
            after={<StateBadge {...rowBadge(row)} />}
          />
        ))}
      </List>
    </Card>
  );
}
