import { useStaffLoanQuery } from '@/components/lending/queries';
import { StaffLoanBody } from '@/components/lending/StaffLoan';
import { Failed, Heading, LinkButton, Loading, Mono, Stack, Text } from '@/components/ui';

/** The chosen line of the desk, beside the list where the window is wide enough. */
export function DeskLoan({ loanId }: { loanId: string }) {
  const loan = useStaffLoanQuery(loanId);
  if (loan.isPending) return <Loading label="Fetching the loan" />;
  if (loan.isError) return <Failed error={loan.error} onRetry={() => void loan.refetch()} />;
  const { kitNumber, title, borrower } = loan.data;
  return (
    <Stack gap="lg">
      <Stack gap="xxs">
        <Mono size="quiet" tone="soft">{`Kit ${kitNumber}`}</Mono>
        <Heading level={2}>{title}</Heading>
        <Text tone="soft">{borrower.name}</Text>
      </Stack>
      <StaffLoanBody view={loan.data} />
      <LinkButton label="Open the loan with its custody" to={`/loans/${loanId}`} />
    </Stack>
  );
}
