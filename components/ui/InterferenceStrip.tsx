import { StyleSheet, View } from 'react-native';
import { colourSeries } from '@shared/gem/figureColour';
import { useTheme } from '@/components/theme';

const series = colourSeries(64);
const gradient = `linear-gradient(to right, ${series.join(', ')})`;

/** The interference colour series, first to third order: the mark under the name. Decoration only. */
export function InterferenceStrip({ height = 4 }: { height?: number }) {
  return <View aria-hidden style={[styles.strip, { height, backgroundImage: gradient }]} />;
}

export interface TimeBarProps {
  /** Share of the time that has passed, 0 to 1; more than 1 is overdue. */
  passed: number;
  /** What the bar says, for a screen reader: "5 of 9 days have passed". */
  label: string;
}

/** How far a loan has run: the strip with a mark at the present. */
export function TimeBar({ passed, label }: TimeBarProps) {
  const { colors } = useTheme();
  const share = Math.min(1, Math.max(0, passed));
  return (
    <View role="img" aria-label={label} style={styles.bar}>
      <View style={[styles.barStrip, { backgroundImage: gradient }]} />
      <View style={[styles.mark, { left: `${share * 100}%`, backgroundColor: colors.ink, borderColor: colors.sheet }]} />
    </View>
  );
}

const styles = StyleSheet.create({
  strip: { width: '100%' },
  bar: { height: 22, justifyContent: 'center' },
  barStrip: { height: 12, borderRadius: 6 },
  mark: { position: 'absolute', top: 0, bottom: 0, width: 6, marginLeft: -3, borderRadius: 3, borderWidth: 1.5 },
});
