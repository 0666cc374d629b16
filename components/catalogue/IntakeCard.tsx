import type { Attribute } from '@shared/api/evidence';
import type { StoneView } from '@shared/api/kits';
import { useInstrumentsQuery } from '@/components/readings/instruments';
import { ReadingForm } from '@/components/readings/ReadingForm';
import { Card, Failed, Loading, Text, useAnnounce } from '@/components/ui';
import { useIntakeMutation } from './queries';

const usual: readonly Attribute[] = ['weight_ct', 'length_mm', 'width_mm', 'height_mm', 'polariscope'];

/** Intake at the bench: repeated readings, from which the recorded value and its uncertainty follow. */
export function IntakeCard({ stone }: { stone: StoneView }) {
  const register = useInstrumentsQuery();
  const intake = useIntakeMutation(stone.id);
  const announce = useAnnounce();
  const missing = stone.gaps.flatMap((gap) => (gap.attribute ? [gap.attribute] : []));
  if (register.isPending) return <Loading label="Fetching the instruments" />;
  if (register.isError) return <Failed error={register.error} onRetry={() => void register.refetch()} />;
  return (
    <Card title="Enter intake readings">
      <Text size="quiet" tone="soft">Read each value more than once, lifting the stone between readings. Repeats show how well it can be known; they never replace.</Text>
      <ReadingForm
        attributes={missing.length > 0 ? [...new Set(missing)] : usual}
        flags={stone.flags}
        register={register.data}
        submitLabel="Add to the record"
        busy={intake.isPending}
        error={intake.error}
        onSubmit={(readings) => intake.mutate({ readings }, { onSuccess: () => announce('Added to the record') })}
      />
    </Card>
  );
}
