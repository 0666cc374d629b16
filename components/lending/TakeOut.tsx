import type { LoanView } from '@shared/api/loans';
import { Button, Failed, Stack, useAnnounce } from '@/components/ui';
import { useState } from 'react';
import { Dialog, Text } from '@/components/ui';
import { PayStep } from './PayStep';
import { useCancelLoanMutation } from './queries';
import { ScanJars } from './ScanJars';
import { TermsStep } from './TermsStep';

/** Taking out, step by step: every jar seen, terms accepted, deposit paid. */
export function TakeOut({ loan }: { loan: LoanView }) {
  const step = loan.actions.includes('scan_jars') ? 'jars' : loan.actions.includes('accept_terms') ? 'terms' : 'pay';
  return (
    <Stack gap="lg">
      {step === 'jars' ? <ScanJars loan={loan} /> : null}
      {step === 'terms' ? <TermsStep loan={loan} /> : null}
      {step === 'pay' ? <PayStep loan={loan} /> : null}
      <Cancel loan={loan} />
    </Stack>
  );
}

function Cancel({ loan }: { loan: LoanView }) {
  const [open, setOpen] = useState(false);
  const cancel = useCancelLoanMutation(loan.id);
  const announce = useAnnounce();
  return (
    <>
      <Button kind="quiet" label="Cancel and free the kit" haspopup="dialog" onPress={() => setOpen(true)} />
      <Dialog
        open={open}
        onClose={() => setOpen(false)}
        title={`Give kit ${loan.kitNumber} back?`}
        action={<Button kind="danger" label="Free the kit" busy={cancel.isPending} onPress={() => cancel.mutate({}, { onSuccess: () => { setOpen(false); announce('The kit is free again.'); } })} />}
      >
        <Stack>
          <Text>It goes back to the shelf at once. Nothing is held or charged.</Text>
          {cancel.error ? <Failed error={cancel.error} /> : null}
        </Stack>
      </Dialog>
    </>
  );
}
