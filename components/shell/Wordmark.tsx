import { Text as NativeText } from 'react-native';
import { a, useTheme } from '@/components/theme';

/** The product's name, set in the heading face. Not a heading: every page has its own. */
export function Wordmark({ onField = false, large = false }: { onField?: boolean; large?: boolean }) {
  const { colors } = useTheme();
  return <NativeText style={[large ? a.textHeading : a.textSection, { color: onField ? colors.onField : colors.ink }]}>Trayward</NativeText>;
}
