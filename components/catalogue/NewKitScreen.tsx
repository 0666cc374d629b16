import { router } from 'expo-router';
import { RequireRole } from '@/components/shell';
import { PageFrame } from '@/components/ui';
import { KitForm } from './KitForm';
import { useNewKitMutation } from './queries';

/** A new kit; its stones follow on its own page. */
export function NewKitScreen() {
  const create = useNewKitMutation();
  return (
    <RequireRole roles={['instructor', 'admin']}>
      <PageFrame title="Add a kit" back={{ label: 'Kits', to: '/kits' }} lead="Name it twice: once for staff, once so that nothing is given away.">
        <KitForm submitLabel="Add the kit" busy={create.isPending} error={create.error} onSubmit={(kit) => create.mutate(kit, { onSuccess: (made) => router.replace(`/kits/${made.id}`) })} />
      </PageFrame>
    </RequireRole>
  );
}
