import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { size, space, useBreakpoints, useTheme } from '@/components/theme';
import { InterferenceStrip } from '@/components/ui/InterferenceStrip';
import { SkipLink } from '@/components/ui/SkipLink';
import { Wordmark } from './Wordmark';

/** Frame of the pages that need no sign-in: one column in the middle, the name over it. */
export function PublicShell({ children }: { children: ReactNode }) {
  const { colors } = useTheme();
  const { phone } = useBreakpoints();
  return (
    <View style={[styles.shell, { backgroundColor: colors.ground }]}>
      <SkipLink />
      <View role="banner">
        <InterferenceStrip height={5} />
        <View style={[styles.name, phone ? null : styles.nameWide]}>
          <Wordmark />
        </View>
      </View>
      <View style={[styles.page, phone ? null : styles.pageWide]}>{children}</View>
    </View>
  );
}

const styles = StyleSheet.create({
  shell: { flex: 1 },
  name: { paddingHorizontal: space.side, paddingVertical: space.md },
  nameWide: { width: '100%', maxWidth: size.column, alignSelf: 'center' },
  page: { flex: 1, minHeight: 0 },
  pageWide: { width: '100%', maxWidth: size.column, alignSelf: 'center' },
});
