import { StyleSheet, View } from 'react-native';
import { a, radius, space, useTheme } from '@/components/theme';
import { Icon, Text } from '@/components/ui';

const keys = ['1', '2', '3', '4', '5', '6', '7', '8', '9', '.', '0', 'erase'] as const;
export type PadKey = (typeof keys)[number];

/** The text of a field after one key of the pad; a second point is not taken. */
export function typed(text: string, key: PadKey): string {
  if (key === 'erase') return text.slice(0, -1);
  return key === '.' && text.includes('.') ? text : text + key;
}

/**
 * Large keys under the field that is being filled, for one hand on a phone. The field keeps the focus, so a keyboard, a
 * hand scanner or a balance that types goes on working; the keys are left out of the tab order for the same reason.
 */
export function NumberPad({ label, onKey, onNext }: { label: string; onKey: (key: PadKey) => void; onNext: () => void }) {
  return (
    <View role="group" aria-label={`Keys for ${label}`} style={styles.pad}>
      {keys.map((key) => (
        <PadButton key={key} name={key === 'erase' ? 'Erase the last digit' : key === '.' ? 'Point' : key} onPress={() => onKey(key)}>
          {key === 'erase' ? <EraseIcon /> : <Text style={[a.mono, styles.digit]}>{key}</Text>}
        </PadButton>
      ))}
      <PadButton name="Next reading" wide onPress={onNext}>
        <Text strong tone="action">Next</Text>
      </PadButton>
    </View>
  );
}

function EraseIcon() {
  const { colors } = useTheme();
  return <Icon name="erase" colour={colors.ink} size={22} />;
}

function PadButton({ name, wide = false, onPress, children }: { name: string; wide?: boolean; onPress: () => void; children: React.ReactNode }) {
  const { colors } = useTheme();
  return (
    <button
      type="button"
      tabIndex={-1}
      aria-label={name}
      // The press must not take the focus out of the field.
      onPointerDown={(event) => event.preventDefault()}
      onMouseDown={(event) => event.preventDefault()}
      onClick={onPress}
      style={{
        flex: wide ? '1 0 100%' : '1 0 30%',
        minHeight: 54,
        border: `1px solid ${colors.rule}`,
        borderRadius: radius.button,
        backgroundColor: colors.sheet,
        cursor: 'pointer',
        touchAction: 'manipulation',
      }}
    >
      {children}
    </button>
  );
}

const styles = StyleSheet.create({
  pad: { flexDirection: 'row', flexWrap: 'wrap', gap: space.sm },
  digit: { fontSize: 24, lineHeight: 30 },
});
