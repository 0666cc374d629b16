import { useLocalSearchParams } from 'expo-router';
import { ApiProblem, useSession } from '@/components/api';
import { Failed, Loading, PageFrame } from '@/components/ui';
import { BorrowedLoan } from './BorrowedLoan';
import { useCheckPaymentQuery, useLoanQuery, useStaffLoanQuery } from './queries';
import { StaffLoan } from './StaffLoan';

/** One loan: the borrower's blind view, or the staff's view of somebody else's loan. */
export function LoanScreen() {
  const { loanId, payment } = useLocalSearchParams<{ loanId: string; payment?: string }>();
  const { hasRole } = useSession();
  const staff = hasRole('admin', 'instructor');
  const staffLoan = useStaffLoanQuery(loanId, staff);
  const own = !staff || (staffLoan.error instanceof ApiProblem && staffLoan.error.code === 'own_loan') || payment !== undefined;
  const check = useCheckPaymentQuery(loanId, own && payment === 'done');
  const loan = useLoanQuery(loanId, own);
  if (staff && staffLoan.data && payment === undefined) return <StaffLoan view={staffLoan.data} />;
  if (loan.data && own) return <BorrowedLoan loan={loan.data} payment={payment ?? null} checking={check.isFetching} checkError={check.error} />;
  const failed = own ? loan : staffLoan;
  return (
    <PageFrame title="Loan">
      {failed.isError ? <Failed error={failed.error} onRetry={() => void failed.refetch()} /> : <Loading label="Fetching the loan" />}
    </PageFrame>
  );
}
