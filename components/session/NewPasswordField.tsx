import { useState } from 'react';
import { PasswordField } from '@/components/ui/fields';

/** Shortest password that is taken, in characters; length, not tricks, makes it strong (NIST SP 800-63B). */
export const shortestPassword = 10;

export interface NewPasswordState {
  value: string;
  onChange: (value: string) => void;
  error: string | undefined;
  /** Shows what is wrong from now on; true when nothing is. */
  check: () => boolean;
}

export function useNewPassword(): NewPasswordState {
  const [value, onChange] = useState('');
  const [checked, setChecked] = useState(false);
  const short = Array.from(value).length < shortestPassword;
  return {
    value,
    onChange,
    error: checked && short ? `Use at least ${shortestPassword} characters.` : undefined,
    check: () => {
      setChecked(true);
      return !short;
    },
  };
}

export function NewPasswordField({ state, error }: { state: NewPasswordState; error?: string | undefined }) {
  return (
    <PasswordField
      label="New password"
      hint={`At least ${shortestPassword} characters. Three or four words that do not belong together are good.`}
      isNew
      required
      value={state.value}
      onChange={state.onChange}
      error={state.error ?? error}
    />
  );
}
