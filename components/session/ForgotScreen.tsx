import { useMutation } from '@tanstack/react-query';
import { useState } from 'react';
import type { PasswordResetRequest } from '@shared/api/sessions';
import { fieldError, useApi } from '@/components/api';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { TextField } from '@/components/ui/fields';
import { Form } from '@/components/ui/Form';
import { Link } from '@/components/ui/Link';
import { PageFrame } from '@/components/ui/PageFrame';
import { Failed } from '@/components/ui/states';
import { Text } from '@/components/ui/Text';

/** Asks for a reset link. The answer is the same whether or not an account has this address. */
export function ForgotScreen() {
  const api = useApi();
  const ask = useMutation({ mutationFn: (request: PasswordResetRequest) => api.post<undefined>('/password-resets', request, { signedIn: false }) });
  const [email, setEmail] = useState('');
  const [asked, setAsked] = useState(false);
  const missing = asked && !email.includes('@') ? 'Enter an e-mail address, such as name@school.example.' : undefined;

  function submit() {
    setAsked(true);
    if (email.includes('@') && !ask.isPending) ask.mutate({ email: email.trim() });
  }

  if (ask.isSuccess) {
    return (
      <PageFrame title="Look in your mail">
        <Text>If an account has the address {email.trim()}, a link to choose a new password is on its way. The link works for a short time and once.</Text>
        <Text>No mail after some minutes? Look in the junk folder, or ask an admin of your school which address they have.</Text>
        <Link label="Back to sign in" to="/sign-in" />
      </PageFrame>
    );
  }
  return (
    <PageFrame title="Choose a new password" lead="We send a link to your e-mail address." back={{ label: 'Sign in', to: '/sign-in' }}>
      <Card>
        <Form onSubmit={submit}>
          <TextField
            label="E-mail"
            value={email}
            onChange={setEmail}
            error={missing ?? fieldError(ask.error, 'email')}
            required
            inputMode="email"
            autoComplete="username"
            autoCapitalize="none"
            autoCorrect={false}
            spellCheck={false}
          />
          {ask.isError ? <Failed error={ask.error} /> : null}
          <Button label="Send the link" submits busy={ask.isPending} />
        </Form>
      </Card>
    </PageFrame>
  );
}
