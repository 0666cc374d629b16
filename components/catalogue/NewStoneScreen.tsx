import { router, useLocalSearchParams } from 'expo-router';
import { RequireRole } from '@/components/shell';
import { Failed, Loading, PageFrame } from '@/components/ui';
import { useKitQuery, useNewStoneMutation } from './queries';
import { emptyStone } from './stoneDraft';
import { StoneForm } from './StoneForm';

/** A new stone of a kit, in the first free jar. */
export function NewStoneScreen() {
  const { kitId } = useLocalSearchParams<{ kitId: string }>();
  const kit = useKitQuery(kitId);
  const create = useNewStoneMutation(kitId);
  const taken = new Set(kit.data?.stones.filter((stone) => stone.standing !== 'retired').map((stone) => stone.slot));
  const free = 'ABCDEFGHIJKLMNOPQRSTUVWXYZ'.split('').find((letter) => !taken.has(letter)) ?? '';
  return (
    <RequireRole roles={['instructor', 'admin']}>
      <PageFrame title="Add a stone" {...(kit.data ? { eyebrow: `Kit ${kit.data.number}` } : {})} back={{ label: 'Kit', to: `/kits/${kitId}` }}>
        {kit.isPending ? <Loading label="Fetching the kit" /> : null}
        {kit.isError ? <Failed error={kit.error} onRetry={() => void kit.refetch()} /> : null}
        {kit.data ? (
          <StoneForm
            initial={emptyStone(free)}
            currency={kit.data.currency}
            submitLabel="Add the stone"
            busy={create.isPending}
            error={create.error}
            onSubmit={(stone) => create.mutate(stone, { onSuccess: (made) => router.replace(`/stones/${made.id}`) })}
          />
        ) : null}
      </PageFrame>
    </RequireRole>
  );
}
