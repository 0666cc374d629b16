import { useId } from 'react';
import { StyleSheet, View } from 'react-native';
import { a, radius, size, space, useTheme } from '@/components/theme';
import { Field, unseen, useFieldAttributes } from './Field';
import { Labelled, type LabelledProps } from './fields';
import { Text } from './Text';

export interface Option<Value extends string> {
  value: Value;
  label: string;
  hint?: string;
}

type ChoiceProps<Value extends string> = LabelledProps & {
  options: readonly Option<Value>[];
  value: Value | '';
  onChange: (value: Value) => void;
};

/** The browser's own list: short, familiar on a phone, searchable by typing. For long lists. */
export function SelectField<Value extends string>({ options, value, onChange, placeholder = 'Choose …', ...labelled }: ChoiceProps<Value> & { placeholder?: string }) {
  return (
    <Labelled {...labelled}>
      <NativeSelect options={options} value={value} onChange={onChange} placeholder={placeholder} />
    </Labelled>
  );
}

function NativeSelect<Value extends string>({ options, value, onChange, placeholder }: Pick<ChoiceProps<Value>, 'options' | 'value' | 'onChange'> & { placeholder: string }) {
  const { colors } = useTheme();
  const attributes = useFieldAttributes();
  return (
    <select
      {...attributes}
      value={value}
      onChange={(event) => {
        const chosen = options.find((option) => option.value === event.target.value);
        if (chosen) onChange(chosen.value);
      }}
      style={{
        ...StyleSheet.flatten([a.textText]),
        minHeight: 48,
        maxWidth: '100%',
        padding: `0 ${space.md}px`,
        borderRadius: radius.button,
        border: `1.5px solid ${colors.edge}`,
        backgroundColor: colors.sheet,
        color: colors.ink,
        lineHeight: 'normal',
      }}
    >
      {value === '' ? <option value="">{placeholder}</option> : null}
      {options.map((option) => (
        <option key={option.value} value={option.value}>
          {option.label}
        </option>
      ))}
    </select>
  );
}

/** One of a few, each with its words: real radio buttons, one under another. */
export function RadioField<Value extends string>({ label, hint, error, options, value, onChange }: ChoiceProps<Value>) {
  const name = useId();
  const { colors } = useTheme();
  return (
    <GroupFrame label={label} hint={hint} error={error}>
      {options.map((option) => (
        <label key={option.value} style={{ display: 'flex', alignItems: 'center', gap: space.md, minHeight: size.target, cursor: 'pointer' }}>
          <input
            type="radio"
            name={name}
            value={option.value}
            checked={value === option.value}
            onChange={() => onChange(option.value)}
            style={{ width: 22, height: 22, margin: 0, flexShrink: 0, accentColor: colors.action }}
          />
          <View>
            <Text>{option.label}</Text>
            {option.hint ? (
              <Text size="quiet" tone="soft">
                {option.hint}
              </Text>
            ) : null}
          </View>
        </label>
      ))}
    </GroupFrame>
  );
}

/** One of two to five short words, side by side. The arrows move the choice, as in any radio group. */
export function SegmentedField<Value extends string>({ label, labelHidden, hint, error, options, value, onChange }: ChoiceProps<Value>) {
  const name = useId();
  const { colors } = useTheme();
  return (
    <GroupFrame label={label} hint={hint} error={error} {...(labelHidden ? { labelHidden } : {})}>
      <View style={[styles.segments, { borderColor: colors.edge, backgroundColor: colors.sheet }]}>
        {options.map((option) => {
          const chosen = option.value === value;
          return (
            <label
              key={option.value}
              style={{
                ...segment,
                backgroundColor: chosen ? colors.solid : 'transparent',
              }}
            >
              <input type="radio" name={name} value={option.value} checked={chosen} onChange={() => onChange(option.value)} style={unseen} />
              <Text strong align="centre" tone="inherit" style={{ color: chosen ? colors.onSolid : colors.ink }}>
                {option.label}
              </Text>
            </label>
          );
        })}
      </View>
    </GroupFrame>
  );
}

/** Yes or no. The whole line can be pressed. */
export function CheckboxField({ label, hint, error, checked, onChange }: Omit<LabelledProps, 'labelHidden'> & { checked: boolean; onChange: (checked: boolean) => void }) {
  return (
    <Field.Root error={error} hint={hint !== undefined}>
      <CheckboxLine label={label} checked={checked} onChange={onChange} />
      {hint !== undefined ? <Field.Hint>{hint}</Field.Hint> : null}
      <Field.Error />
    </Field.Root>
  );
}

function CheckboxLine({ label, checked, onChange }: { label: string; checked: boolean; onChange: (checked: boolean) => void }) {
  const { colors } = useTheme();
  const attributes = useFieldAttributes();
  return (
    <label style={{ display: 'flex', alignItems: 'center', gap: space.md, minHeight: size.target, cursor: 'pointer' }}>
      <input
        {...attributes}
        type="checkbox"
        checked={checked}
        onChange={(event) => onChange(event.target.checked)}
        style={{ width: 22, height: 22, margin: 0, flexShrink: 0, accentColor: colors.action }}
      />
      <Text>{label}</Text>
    </label>
  );
}

function GroupFrame({ label, hint, error, labelHidden, children }: Pick<LabelledProps, 'label' | 'hint' | 'error' | 'labelHidden'> & { children: React.ReactNode }) {
  return (
    <fieldset style={{ border: 0, margin: 0, padding: 0, minWidth: 0 }} aria-invalid={error !== undefined}>
      <legend style={labelHidden ? unseen : { padding: 0, marginBottom: 6 }}>
        <Text strong>{label}</Text>
      </legend>
      <Field.Root error={error} hint={hint !== undefined}>
        {hint !== undefined ? <Field.Hint>{hint}</Field.Hint> : null}
        {children}
        <Field.Error />
      </Field.Root>
    </fieldset>
  );
}

const segment = {
  display: 'flex',
  flex: 1,
  alignItems: 'center',
  justifyContent: 'center',
  position: 'relative',
  minHeight: size.target,
  minWidth: size.target,
  padding: `0 ${space.sm}px`,
  borderRadius: radius.sm,
  cursor: 'pointer',
} as const;

const styles = StyleSheet.create({
  segments: { flexDirection: 'row', flexWrap: 'wrap', gap: 2, padding: 2, borderWidth: 1.5, borderRadius: radius.button },
});
