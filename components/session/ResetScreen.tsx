import { useMutation } from '@tanstack/react-query';
import { useLocalSearchParams } from 'expo-router';
import type { NewPasswordRequest } from '@shared/api/sessions';
import { fieldError, useApi } from '@/components/api';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Form } from '@/components/ui/Form';
import { LinkButton } from '@/components/ui/Link';
import { PageFrame } from '@/components/ui/PageFrame';
import { Failed } from '@/components/ui/states';
import { Text } from '@/components/ui/Text';
import { NewPasswordField, useNewPassword } from './NewPasswordField';

/** Reached from the link in the mail: sets a new password. */
export function ResetScreen() {
  const { token } = useLocalSearchParams<{ token: string }>();
  const api = useApi();
  const reset = useMutation({
    mutationFn: (request: NewPasswordRequest) => api.post<undefined>(`/password-resets/${encodeURIComponent(token)}`, request, { signedIn: false }),
  });
  const password = useNewPassword();

  function submit() {
    if (password.check() && !reset.isPending) reset.mutate({ password: password.value });
  }

  if (reset.isSuccess) {
    return (
      <PageFrame title="Your new password is set">
        <Text>You were signed out everywhere else. Sign in with the new password.</Text>
        <LinkButton kind="primary" label="Sign in" to="/sign-in" replace />
      </PageFrame>
    );
  }
  return (
    <PageFrame title="Choose a new password">
      <Card>
        <Form onSubmit={submit}>
          <NewPasswordField state={password} error={fieldError(reset.error, 'password')} />
          {reset.isError ? <Failed error={reset.error} /> : null}
          <Button label="Set the password" submits busy={reset.isPending} />
        </Form>
      </Card>
    </PageFrame>
  );
}
