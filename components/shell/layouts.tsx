import { Slot } from 'expo-router';
import { useSession } from '@/components/api';
import { RequireSession } from './guards';
import { PublicShell } from './PublicShell';
import { SchoolShell } from './SchoolShell';

/** Layout of every signed-in route. A change of school starts the page anew, so that nothing of the other one stays. */
export function SchoolLayout() {
  const { status, school } = useSession();
  if (status !== 'signedIn' || !school) {
    return (
      <PublicShell>
        <RequireSession>{null}</RequireSession>
      </PublicShell>
    );
  }
  return (
    <SchoolShell>
      <Slot key={school.schoolId} />
    </SchoolShell>
  );
}

export function PublicLayout() {
  return (
    <PublicShell>
      <Slot />
    </PublicShell>
  );
}
