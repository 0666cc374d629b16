import { useId, type KeyboardEvent } from 'react';
import { Pressable, StyleSheet, View } from 'react-native';
import { a, family, radius, size, space, type as typeOf, useTheme } from '@/components/theme';
import { Button } from './Button';
import { Icon } from './Icon';
import { Mono, Text } from './Text';

export interface KeypadProps {
  /** What is being read: "Weight". */
  label: string;
  unit?: string;
  /** The typed text; read it with `parseNumber`. */
  value: string;
  onChange: (value: string) => void;
  onEnter: () => void;
  enterLabel: string;
  error?: string | undefined;
  /** Quiet words under the number: the instrument in use. */
  hint?: string;
  /** Digits that may be typed, the point not counted. */
  mostDigits?: number;
  /** Puts the focus in the number, so that a keyboard can type at once. */
  autoFocus?: boolean;
}

const keys = ['1', '2', '3', '4', '5', '6', '7', '8', '9', '.', '0', 'erase'] as const;

/**
 * The bench's number pad: large keys for one hand, while the number above is a real field, so that a keyboard or a
 * balance that types works as well. The phone's own keyboard stays away.
 */
export function Keypad({ label, unit, value, onChange, onEnter, enterLabel, error, hint, mostDigits = 8, autoFocus }: KeypadProps) {
  const t = useTheme();
  const id = useId();

  function type(key: (typeof keys)[number]) {
    if (key === 'erase') onChange(value.slice(0, -1));
    else onChange(cleaned(value + key, mostDigits));
  }

  return (
    <View style={styles.pad}>
      <label htmlFor={id} style={{ display: 'block' }}>
        <Text strong id={`${id}l`}>
          {label}
        </Text>
      </label>
      <View style={[styles.screen, { backgroundColor: t.colors.sheet, borderColor: error ? t.colors.different : t.colors.edge }]}>
        <input
          id={id}
          value={value}
          inputMode="none"
          autoComplete="off"
          autoFocus={autoFocus}
          aria-labelledby={unit ? `${id}l ${id}u` : undefined}
          aria-invalid={error !== undefined}
          aria-describedby={error || hint ? `${id}d` : undefined}
          onChange={(event) => onChange(cleaned(event.target.value, mostDigits))}
          onKeyDown={(event: KeyboardEvent) => {
            if (event.key !== 'Enter') return;
            event.preventDefault();
            onEnter();
          }}
          style={{ ...input, fontFamily: family.mono, color: t.colors.ink }}
        />
        {unit ? (
          <Mono tone="soft" id={`${id}u`}>
            {unit}
          </Mono>
        ) : null}
      </View>
      {error || hint ? (
        <Text id={`${id}d`} size="quiet" tone={error ? 'different' : 'soft'} {...(error ? { role: 'alert' as const } : {})}>
          {error ?? hint}
        </Text>
      ) : null}
      <View role="group" aria-label={`Keys for ${label}`} style={styles.keys}>
        {keys.map((key) => (
          <Pressable
            key={key}
            role="button"
            aria-label={key === 'erase' ? 'Erase the last digit' : key === '.' ? 'Point' : key}
            onPress={() => type(key)}
            style={({ pressed }) => [styles.key, { backgroundColor: pressed ? t.colors.actionGround : t.colors.sheet, borderColor: t.colors.rule }]}
          >
            {key === 'erase' ? <Icon name="erase" colour={t.colors.ink} size={22} weight={1.4} /> : <Text style={[a.mono, styles.keyText]}>{key}</Text>}
          </Pressable>
        ))}
      </View>
      <Button label={enterLabel} onPress={onEnter} />
    </View>
  );
}

/** Digits and one point; a comma counts as a point. */
function cleaned(text: string, mostDigits: number): string {
  const plain = text.replace(/,/g, '.').replace(/[^\d.]/g, '');
  const [whole = '', ...rest] = plain.split('.');
  const fraction = rest.join('').slice(0, Math.max(0, mostDigits - whole.length));
  const digits = whole.slice(0, mostDigits);
  return rest.length > 0 ? `${digits}.${fraction}` : digits;
}

const input = {
  flex: 1,
  minWidth: 0,
  width: '100%',
  border: 0,
  padding: 0,
  background: 'transparent',
  fontSize: typeOf.figure.fontSize,
  lineHeight: `${typeOf.figure.lineHeight}px`,
  textAlign: 'right',
} as const;

const styles = StyleSheet.create({
  pad: { gap: space.sm, maxWidth: 420, width: '100%' },
  screen: { flexDirection: 'row', alignItems: 'baseline', gap: space.sm, paddingHorizontal: space.lg, paddingVertical: space.sm, borderWidth: 1.5, borderRadius: radius.sheet },
  keys: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  key: { flexBasis: '30%', flexGrow: 1, minHeight: size.target + 12, alignItems: 'center', justifyContent: 'center', borderWidth: 1, borderRadius: radius.button },
  keyText: { fontSize: 24, lineHeight: 30 },
});
