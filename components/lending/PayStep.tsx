import type { LoanView } from '@shared/api/loans';
import { Button, Failed, formatMoment, formatMoney, Stack, Text } from '@/components/ui';
import { DepositCard } from './DepositCard';
import { useOpenPaymentMutation } from './queries';
import { useClock } from './useClock';

/** What will happen with the money, said before it does; then off to the payment service's own page. */
export function PayStep({ loan }: { loan: LoanView }) {
  const pay = useOpenPaymentMutation(loan.id);
  const clock = useClock();
  const { amountMinor, currency } = loan.deposit;
  const go = () =>
    pay.mutate(undefined, {
      onSuccess: ({ url }) => {
        if (url !== null) globalThis.location.assign(url);
      },
    });
  return (
    <Stack gap="lg">
      <DepositCard deposit={loan.deposit} />
      <Text size="quiet" tone="soft">{`You pay on the payment service’s own page; your card’s number never comes here. The kit is kept for you until ${formatMoment(loan.reservedUntil, clock)}.`}</Text>
      {pay.error ? <Failed error={pay.error} /> : null}
      <Button label={amountMinor === 0 ? 'Take it out' : `Pay the deposit of ${formatMoney(amountMinor, currency)}`} busy={pay.isPending || (pay.isSuccess && pay.data.url !== null)} onPress={go} />
    </Stack>
  );
}
