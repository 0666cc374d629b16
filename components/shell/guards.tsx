import { Redirect, usePathname } from 'expo-router';
import type { ReactNode } from 'react';
import type { Role } from '@shared/api/common';
import { useRestoreSession, useSession } from '@/components/api';
import { Button } from '@/components/ui/Button';
import { LinkButton } from '@/components/ui/Link';
import { PageFrame } from '@/components/ui/PageFrame';
import { Loading } from '@/components/ui/states';
import { Text } from '@/components/ui/Text';
import { homeFor } from './places';
import { signInAddress } from './signInAddress';

/** Lets signed-in people through; asks others to sign in and brings them back here afterwards. */
export function RequireSession({ children }: { children: ReactNode }) {
  const session = useSession();
  const pathname = usePathname();
  if (session.status === 'restoring') return <Loading label="Opening your school" />;
  if (session.status === 'unreachable') return <Unreachable />;
  if (session.status === 'signedOut') return <Redirect href={signInAddress(pathname)} />;
  if (!session.school) return <NoSchool />;
  return children;
}

/** Lets people with one of these roles through; tells others whose page it is. For a screen's own route. */
export function RequireRole({ roles, children }: { roles: readonly Role[]; children: ReactNode }) {
  const session = useSession();
  if (session.hasRole(...roles)) return children;
  return (
    <PageFrame title="This page is not for your role" lead={`It is for ${roles.map((role) => `${role}s`).join(' and ')} of ${session.school?.schoolName ?? 'a school'}.`}>
      <LinkButton kind="primary" label="Go to your start page" to={homeFor(session.roles) ?? '/'} replace />
    </PageFrame>
  );
}

export function Unreachable() {
  const restore = useRestoreSession();
  return (
    <PageFrame title="The server cannot be reached" lead="Check your connection. Nothing you entered was lost.">
      <Button label="Try again" onPress={restore} />
    </PageFrame>
  );
}

function NoSchool() {
  return (
    <PageFrame title="You belong to no school yet">
      <Text>Ask an admin of your school to invite this e-mail address, then open the link in the invitation.</Text>
    </PageFrame>
  );
}
