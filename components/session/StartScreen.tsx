import { Redirect } from 'expo-router';
import { useSession } from '@/components/api';
import { RequireSession } from '@/components/shell/guards';
import { homeFor } from '@/components/shell/places';
import { PublicShell } from '@/components/shell/PublicShell';

/** The bare address: leads everybody to where their day starts. */
export function StartScreen() {
  const { roles } = useSession();
  const home = homeFor(roles);
  return (
    <PublicShell>
      <RequireSession>{home ? <Redirect href={home} /> : null}</RequireSession>
    </PublicShell>
  );
}
