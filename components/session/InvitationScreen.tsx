import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { Redirect, useLocalSearchParams } from 'expo-router';
import { useState } from 'react';
import type { AcceptInvitationRequest, InvitationOffer } from '@shared/api/people';
import type { SessionView } from '@shared/api/sessions';
import { ApiProblem, fieldError, useApi, useSession, useSessionStore } from '@/components/api';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { PasswordField, TextField } from '@/components/ui/fields';
import { Form } from '@/components/ui/Form';
import { Link } from '@/components/ui/Link';
import { PageFrame } from '@/components/ui/PageFrame';
import { Failed, Loading } from '@/components/ui/states';
import { shortestPassword } from './NewPasswordField';

/** Reached from the link in an invitation: makes an account, or joins a school with the account one has. */
export function InvitationScreen() {
  const { token } = useLocalSearchParams<{ token: string }>();
  const api = useApi();
  const offer = useQuery({
    queryKey: ['invitation', token],
    queryFn: ({ signal }) => api.get<InvitationOffer>(`/invitations/${encodeURIComponent(token)}`, { signal, signedIn: false }),
  });
  if (offer.isPending) {
    return (
      <PageFrame title="Your invitation">
        <Loading label="Opening your invitation" />
      </PageFrame>
    );
  }
  if (offer.isError) {
    const gone = offer.error instanceof ApiProblem && (offer.error.status === 404 || offer.error.status === 410);
    return (
      <PageFrame title={gone ? 'This invitation no longer works' : 'Your invitation'}>
        <Failed error={offer.error} {...(gone ? {} : { onRetry: () => void offer.refetch() })} />
        <Link label="Sign in instead" to="/sign-in" />
      </PageFrame>
    );
  }
  return <Acceptance token={token} offer={offer.data} />;
}

function Acceptance({ token, offer }: { token: string; offer: InvitationOffer }) {
  const { accept, name, setName, password, setPassword, errors, submit } = useAcceptance(token, offer);
  const session = useSession();
  if (accept.isSuccess && session.status === 'signedIn') return <Redirect href="/" />;
  return (
    <PageFrame title={`Join ${offer.schoolName}`} lead={`As ${offer.roles.join(' and ')}, with the address ${offer.email}.`}>
      <Card>
        <Form onSubmit={submit}>
          <TextField label="Your name" value={name} onChange={setName} error={errors.name} required autoComplete="name" />
          <PasswordField
            label="Password"
            hint={`A new one of at least ${shortestPassword} characters; or, if you have an account with this address, the one you have.`}
            isNew
            required
            value={password}
            onChange={setPassword}
            error={errors.password}
          />
          {accept.isError ? <Failed error={accept.error} /> : null}
          <Button label={`Join ${offer.schoolName}`} submits busy={accept.isPending} />
        </Form>
      </Card>
    </PageFrame>
  );
}

function useAcceptance(token: string, offer: InvitationOffer) {
  const api = useApi();
  const store = useSessionStore();
  const queries = useQueryClient();
  const [name, setName] = useState(offer.name);
  const [password, setPassword] = useState('');
  const [asked, setAsked] = useState(false);
  const accept = useMutation({
    mutationFn: async (request: AcceptInvitationRequest) => {
      await api.post<unknown>(`/invitations/${encodeURIComponent(token)}/acceptance`, request, { signedIn: false });
      return api.post<SessionView>('/sessions', { email: offer.email, password: request.password }, { signedIn: false });
    },
    onSuccess: (session) => {
      queries.clear();
      store.signIn(session);
    },
  });
  const errors = {
    name: asked && name.trim() === '' ? 'Enter your name, as others here should see it.' : fieldError(accept.error, 'name'),
    password: asked && password === '' ? 'Enter a password.' : fieldError(accept.error, 'password'),
  };
  function submit() {
    setAsked(true);
    if (name.trim() !== '' && password !== '' && !accept.isPending) accept.mutate({ name: name.trim(), password });
  }
  return { accept, name, setName, password, setPassword, errors, submit };
}
