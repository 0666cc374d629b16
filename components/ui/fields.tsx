import { useState, type ReactNode } from 'react';
import { Field, type FieldInputProps } from './Field';

export interface LabelledProps {
  label: string;
  hint?: string | undefined;
  error?: string | undefined;
  required?: boolean;
  optional?: boolean;
  /** The label is read aloud but not shown; only where the words stand beside it anyway. */
  labelHidden?: boolean;
}

/** Label, hint, control, error: in that order for eyes and for screen readers. */
export function Labelled({ label, hint, error, required, optional, labelHidden, children }: LabelledProps & { children: ReactNode }) {
  return (
    <Field.Root error={error} hint={hint !== undefined} {...(required ? { required } : {})}>
      <Field.Label {...(optional ? { optional } : {})} {...(labelHidden ? { hidden: true } : {})}>
        {label}
      </Field.Label>
      {hint !== undefined ? <Field.Hint>{hint}</Field.Hint> : null}
      {children}
      <Field.Error />
    </Field.Root>
  );
}

type TextFieldProps = LabelledProps & Omit<FieldInputProps, 'value' | 'onChangeText'> & { value: string; onChange: (value: string) => void };

export function TextField({ label, hint, error, required, optional, labelHidden, onChange, ...input }: TextFieldProps) {
  return (
    <Labelled {...pickLabelled({ label, hint, error, required, optional, labelHidden })}>
      <Field.Input {...input} onChangeText={onChange} />
    </Labelled>
  );
}

/**
 * A number as people type it, comma or point. `value` is the text, so that "1." can be on its way to "1.5";
 * read it with `parseNumber`.
 */
export function NumberField({ label, hint, error, required, optional, labelHidden, onChange, ...input }: TextFieldProps) {
  return (
    <Labelled {...pickLabelled({ label, hint, error, required, optional, labelHidden })}>
      <Field.Input
        {...input}
        mono
        inputMode="decimal"
        autoComplete="off"
        onChangeText={(text) => onChange(text.replace(/[^\d.,\-\s]/g, ''))}
      />
    </Labelled>
  );
}

/** Sign-in passwords and new ones; can be shown while typing. */
export function PasswordField({ isNew, ...props }: TextFieldProps & { isNew?: boolean }) {
  return <TextField {...props} secureTextEntry autoCapitalize="none" autoComplete={isNew ? 'new-password' : 'current-password'} />;
}

/**
 * A typed number, comma or point, or null where it is none.
 * @example parseNumber('1,566') // 1.566
 */
export function parseNumber(text: string): number | null {
  const plain = text.trim().replace(',', '.');
  if (!/^-?(\d+\.?\d*|\.\d+)$/.test(plain)) return null;
  return Number(plain);
}

/** State of one typed text with its error cleared by typing. */
export function useTextState(initial = ''): { value: string; onChange: (value: string) => void } {
  const [value, onChange] = useState(initial);
  return { value, onChange };
}

/** Leaves out what was not given, as exact optional properties want it. */
function pickLabelled({ label, ...rest }: { [K in keyof LabelledProps]-?: LabelledProps[K] | undefined } & { label: string }): LabelledProps {
  const given = Object.fromEntries(Object.entries(rest).filter(([, value]) => value !== undefined));
  return { label, ...given };
}
