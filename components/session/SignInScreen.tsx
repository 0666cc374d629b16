import { Redirect, useLocalSearchParams } from 'expo-router';
import { useState } from 'react';
import { useSession, useSignInMutation } from '@/components/api';
import { homeFor } from '@/components/shell/places';
import { safeNext } from '@/components/shell/signInAddress';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { PasswordField, TextField } from '@/components/ui/fields';
import { Form } from '@/components/ui/Form';
import { Link } from '@/components/ui/Link';
import { Notice } from '@/components/ui/Notice';
import { PageFrame } from '@/components/ui/PageFrame';
import { Failed } from '@/components/ui/states';
import { Text } from '@/components/ui/Text';

export function SignInScreen() {
  const session = useSession();
  const { next } = useLocalSearchParams<{ next?: string }>();
  if (session.status === 'signedIn') return <Redirect href={safeNext(next) ?? homeFor(session.roles) ?? '/'} />;
  return (
    <PageFrame title="Sign in" lead="Use the e-mail address your school knows you by.">
      {session.ended ? (
        <Notice live title="You were signed out">
          <Text size="quiet">Your session ran out. Sign in to go on where you were.</Text>
        </Notice>
      ) : null}
      <SignInForm />
      <Link label="Forgot your password?" to="/forgot" />
    </PageFrame>
  );
}

function SignInForm() {
  const signIn = useSignInMutation();
  const [email, setEmail] = useState('');
  const [password, setPassword] = useState('');
  const [asked, setAsked] = useState(false);
  const missingEmail = asked && email.trim() === '' ? 'Enter your e-mail address.' : undefined;
  const missingPassword = asked && password === '' ? 'Enter your password.' : undefined;

  function submit() {
    setAsked(true);
    if (email.trim() === '' || password === '' || signIn.isPending) return;
    signIn.mutate({ email: email.trim(), password });
  }

  return (
    <Card>
      <Form onSubmit={submit}>
        <TextField
          label="E-mail"
          value={email}
          onChange={setEmail}
          error={missingEmail}
          required
          inputMode="email"
          autoComplete="username"
          autoCapitalize="none"
          autoCorrect={false}
          spellCheck={false}
        />
        <PasswordField label="Password" value={password} onChange={setPassword} error={missingPassword} required />
        {signIn.isError ? <Failed error={signIn.error} /> : null}
        <Button label="Sign in" submits busy={signIn.isPending} />
      </Form>
    </Card>
  );
}
