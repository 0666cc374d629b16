import { useState } from 'react';
import type { InstrumentView } from '@shared/api/instruments';
import { useInstrumentsQuery } from '@/components/readings/instruments';
import { RequireRole } from '@/components/shell';
import { Button, Card, Dialog, EmptyState, Failed, List, ListRow, Loading, PageFrame, Row, Stack, StateBadge, Text, useAnnounce } from '@/components/ui';
import { draftOf, kindWords, toRequest, usualFigures } from './instrumentDraft';
import { InstrumentForm } from './InstrumentForm';
import { useInstrumentChangeMutation, useNewInstrumentMutation } from './queries';

/** The register: readings take their uncertainty from it. */
export function InstrumentsScreen() {
  const register = useInstrumentsQuery();
  const [adding, setAdding] = useState(false);
  const inUse = register.data?.filter((instrument) => !instrument.retired) ?? [];
  return (
    <RequireRole roles={['instructor', 'admin']}>
      <PageFrame
        title={register.data ? (inUse.length === 0 ? 'No instruments yet' : `${inUse.length} instruments in use`) : 'Instruments'}
        documentTitle="Instruments"
        lead="A reading is only as good as its instrument: each takes its uncertainty from here."
        footer={<Button label="Add an instrument" haspopup="dialog" onPress={() => setAdding(true)} />}
      >
        {register.isPending ? <Loading label="Fetching the register" /> : null}
        {register.isError ? <Failed error={register.error} onRetry={() => void register.refetch()} /> : null}
        {register.data?.length === 0 ? <EmptyState title="Nothing to read with">Add the balance, caliper, polariscope and refractometer of the bench, then readings can be entered.</EmptyState> : null}
        {register.data && register.data.length > 0 ? <Register rows={register.data} /> : null}
        {adding ? <Add onClose={() => setAdding(false)} /> : null}
      </PageFrame>
    </RequireRole>
  );
}

function Register({ rows }: { rows: readonly InstrumentView[] }) {
  return (
    <Card padded={false}>
      <List label="Instruments">
        {rows.map((instrument, index) => (
          <ListRow
            key={instrument.id}
            inset
            rule={index < rows.length - 1}
            title={instrument.name}
            detail={figures(instrument)}
            after={
              <Row gap="sm">
                {instrument.retired ? <StateBadge state="neutral" label="retired" /> : null}
                <Change instrument={instrument} />
              </Row>
            }
          />
        ))}
      </List>
    </Card>
  );
}

function figures(instrument: InstrumentView): string {
  const { label, unit } = kindWords[instrument.kind];
  const parts = [label];
  if (instrument.standardUncertainty !== null) parts.push(`u ${instrument.standardUncertainty} ${unit ?? ''}`.trim());
  if (instrument.spotUncertainty !== null) parts.push(`spot u ${instrument.spotUncertainty}`);
  if (instrument.liquidLimitRi !== null) parts.push(`reads to ${instrument.liquidLimitRi}`);
  return parts.join(', ');
}

function Add({ onClose }: { onClose: () => void }) {
  const create = useNewInstrumentMutation();
  const announce = useAnnounce();
  return (
    <Dialog open onClose={onClose} title="Add an instrument">
      <InstrumentForm
        initial={{ kind: 'balance', name: '', ...usualFigures.balance }}
        isNew
        busy={create.isPending}
        error={create.error}
        onSubmit={(draft) => create.mutate(toRequest(draft), { onSuccess: () => { announce('Added to the register'); onClose(); } })}
      />
    </Dialog>
  );
}

function Change({ instrument }: { instrument: InstrumentView }) {
  const [open, setOpen] = useState(false);
  const change = useInstrumentChangeMutation(instrument.id);
  const { version } = instrument;
  const close = () => setOpen(false);
  return (
    <>
      <Button kind="quiet" label="Change" accessibleLabel={`Change ${instrument.name}`} haspopup="dialog" onPress={() => setOpen(true)} />
      {open ? (
        <Dialog open onClose={close} title={instrument.name}>
          <Stack gap="lg">
            <Text size="quiet" tone="soft">Readings already taken keep the uncertainty they were taken with.</Text>
            <InstrumentForm
              initial={draftOf(instrument)}
              isNew={false}
              busy={change.isPending}
              error={change.error}
              onSubmit={(draft) => {
                const { kind: _kind, ...figuresOf } = toRequest(draft);
                change.mutate({ ...figuresOf, version }, { onSuccess: close });
              }}
            />
            <Button kind="quiet" label={instrument.retired ? 'Put back into use' : 'Retire it'} busy={change.isPending} onPress={() => change.mutate({ version, retired: !instrument.retired }, { onSuccess: close })} />
          </Stack>
        </Dialog>
      ) : null}
    </>
  );
}
