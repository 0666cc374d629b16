import { createContext, useContext, useId, type ReactNode } from 'react';
import { StyleSheet, TextInput, View, type TextInputProps } from 'react-native';
import { a, radius, size, space, useTheme } from '@/components/theme';
import { Icon } from './Icon';
import { Mono, Text } from './Text';

interface FieldContext {
  inputId: string;
  labelId: string;
  unitId: string;
  hintId: string;
  errorId: string;
  required: boolean;
  hint: boolean;
  error: string | undefined;
}

const Context = createContext<FieldContext | null>(null);

export function useField(): FieldContext {
  const field = useContext(Context);
  if (!field) throw new Error('This part of a field needs a Field.Root around it');
  return field;
}

/** ARIA attributes of the control inside a Field.Root. */
export function useFieldAttributes() {
  const { inputId, hintId, errorId, required, hint, error } = useField();
  const described = [hint && hintId, error !== undefined && errorId].filter(Boolean).join(' ');
  return {
    id: inputId,
    'aria-invalid': error !== undefined,
    'aria-required': required,
    ...(described ? { 'aria-describedby': described } : {}),
  };
}

export interface FieldRootProps {
  children: ReactNode;
  error?: string | undefined;
  /** True when a Field.Hint stands inside. */
  hint?: boolean;
  required?: boolean;
}

function Root({ children, error, hint = false, required = false }: FieldRootProps) {
  const id = useId();
  return (
    <Context.Provider value={{ inputId: `${id}i`, labelId: `${id}l`, unitId: `${id}u`, hintId: `${id}h`, errorId: `${id}e`, required, hint, error }}>
      <View style={styles.root}>{children}</View>
    </Context.Provider>
  );
}

function Label({ children, optional, hidden }: { children: string; optional?: boolean; hidden?: boolean }) {
  const { inputId, labelId } = useField();
  return (
    <label htmlFor={inputId} style={hidden ? unseen : undefined}>
      <Text strong id={labelId}>
        {children}
      </Text>
      {optional ? <Text tone="soft"> (if you like)</Text> : null}
    </label>
  );
}

function Hint({ children }: { children: string }) {
  const { hintId } = useField();
  return (
    <Text id={hintId} size="quiet" tone="soft">
      {children}
    </Text>
  );
}

/** Shows the error of the root; nothing without one. */
function FieldError() {
  const { errorId, error } = useField();
  const { colors } = useTheme();
  if (error === undefined) return null;
  return (
    <View role="alert" style={styles.error}>
      <Icon name="cross" colour={colors.different} size={14} />
      <Text id={errorId} size="quiet" tone="different" style={a.shrink}>
        {error}
      </Text>
    </View>
  );
}

export interface FieldInputProps extends Pick<TextInputProps, 'value' | 'onChangeText' | 'autoComplete' | 'autoFocus' | 'autoCapitalize' | 'autoCorrect' | 'secureTextEntry' | 'maxLength' | 'placeholder' | 'onBlur' | 'onSubmitEditing' | 'inputMode' | 'spellCheck' | 'readOnly'> {
  /** Digits in the fixed-width face: codes, readings. */
  mono?: boolean;
  /** Lines shown; more than one makes a larger box. */
  lines?: number;
  /** Written after the value and read aloud after the label: ct, mm, €. */
  unit?: string;
  ref?: React.Ref<TextInput>;
}

function Input({ mono, lines = 1, unit, ...rest }: FieldInputProps) {
  const t = useTheme();
  const attributes = useFieldAttributes();
  const { error, labelId, unitId } = useField();
  const many = lines > 1;
  return (
    <View style={styles.inputRow}>
      <TextInput
        {...rest}
        {...attributes}
        {...(unit ? { 'aria-labelledby': `${labelId} ${unitId}` } : {})}
        {...(many ? { multiline: true, rows: lines } : {})}
        placeholderTextColor={t.colors.soft}
        style={[
          styles.input,
          mono ? a.mono : a.textText,
          styles.inputText,
          many && styles.many,
          { backgroundColor: t.colors.sheet, borderColor: error === undefined ? t.colors.edge : t.colors.different, color: t.colors.ink },
        ]}
      />
      {unit ? (
        <Mono tone="soft" id={unitId}>
          {unit}
        </Mono>
      ) : null}
    </View>
  );
}

export const Field = { Root, Label, Hint, Input, Error: FieldError };

export const unseen = {
  position: 'absolute',
  width: 1,
  height: 1,
  overflow: 'hidden',
  clipPath: 'inset(50%)',
  whiteSpace: 'nowrap',
} as const;

const styles = StyleSheet.create({
  root: { gap: 6 },
  error: { flexDirection: 'row', gap: 6, alignItems: 'center' },
  inputRow: { flexDirection: 'row', alignItems: 'center', gap: space.sm },
  input: {
    flexGrow: 1,
    flexShrink: 1,
    minWidth: 0,
    minHeight: 48,
    borderWidth: 1.5,
    borderRadius: radius.button,
    paddingHorizontal: space.md,
    paddingVertical: space.sm,
  },
  inputText: { fontSize: 16 },
  many: { minHeight: size.target * 2, textAlignVertical: 'top' },
});
