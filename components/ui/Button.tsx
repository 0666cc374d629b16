import type { ReactNode } from 'react';
import { Pressable, StyleSheet, View, type StyleProp, type ViewStyle } from 'react-native';
import { radius, size, space, useTheme, type Colors } from '@/components/theme';
import { useFormSubmit } from './Form';
import { Text } from './Text';

export type ButtonKind = 'primary' | 'secondary' | 'danger' | 'quiet';

export interface ButtonLook {
  /** What it does, in words: shown, and read aloud. */
  label: string;
  kind?: ButtonKind;
  /** Before the words; decoration only. */
  icon?: ReactNode;
  style?: StyleProp<ViewStyle>;
}

interface ButtonBase extends ButtonLook {
  /** Longer words for a screen reader, where the label alone does not say which thing it acts on. */
  accessibleLabel?: string;
  /** Shows that the action runs; presses are ignored, the focus stays. */
  busy?: boolean;
  disabled?: boolean;
  describedBy?: string;
  expanded?: boolean;
  haspopup?: 'dialog' | 'menu';
}

export type ButtonProps = ButtonBase & ({ onPress: () => void; submits?: false } | { onPress?: undefined; submits: true });

/** A real button. `submits` sends the Form around it; everything else takes `onPress`. */
export function Button(props: ButtonProps) {
  const { label, kind = 'primary', icon, style, accessibleLabel, busy, disabled, describedBy, expanded, haspopup } = props;
  const submit = useFormSubmit();
  const { colors } = useTheme();
  const act = props.submits ? submit : props.onPress;
  return (
    <Pressable
      role="button"
      aria-label={accessibleLabel ?? label}
      aria-busy={busy ?? false}
      disabled={disabled ?? false}
      aria-expanded={expanded}
      {...(describedBy ? { 'aria-describedby': describedBy } : {})}
      {...(haspopup ? { 'aria-haspopup': haspopup } : {})}
      onPress={() => {
        // While busy the button stays in place for the focus, and ignores presses.
        if (!busy) act();
      }}
      style={({ pressed }) => [buttonShape(kind, colors), pressed && styles.pressed, disabled && styles.disabled, style]}
    >
      <ButtonFace label={busy ? `${label} …` : label} kind={kind} icon={icon} />
    </Pressable>
  );
}

/** The inside of a button, shared with LinkButton. */
export function ButtonFace({ label, kind = 'primary', icon }: ButtonLook) {
  const { colors } = useTheme();
  return (
    <View style={styles.face}>
      {icon}
      <Text strong align="centre" tone="inherit" style={{ color: textColour(kind, colors) }}>
        {label}
      </Text>
    </View>
  );
}

export function buttonShape(kind: ButtonKind, colors: Colors): ViewStyle[] {
  const edge = kind === 'secondary' ? colors.ink : 'transparent';
  const ground = kind === 'primary' ? colors.solid : kind === 'danger' ? colors.different : kind === 'secondary' ? colors.sheet : 'transparent';
  return [styles.shape, kind === 'quiet' ? styles.quiet : styles.main, { backgroundColor: ground, borderColor: edge }];
}

function textColour(kind: ButtonKind, colors: Colors): string {
  if (kind === 'primary') return colors.onSolid;
  if (kind === 'danger') return colors.sheet;
  return kind === 'quiet' ? colors.action : colors.ink;
}

const styles = StyleSheet.create({
  shape: {
    alignItems: 'center',
    justifyContent: 'center',
    borderRadius: radius.button,
    borderWidth: 1.5,
    paddingHorizontal: space.side,
    minWidth: size.target,
  },
  main: { minHeight: size.mainAction },
  quiet: { minHeight: size.target },
  face: { flexDirection: 'row', alignItems: 'center', justifyContent: 'center', gap: space.sm },
  pressed: { opacity: 0.8 },
  disabled: { opacity: 0.55 },
});
