import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { useBreakpoints, useTheme } from '@/components/theme';
import { SkipLink } from '@/components/ui/SkipLink';
import { Rail } from './Rail';
import { TabBar } from './TabBar';
import { TopBar } from './TopBar';

/** Frame of the signed-in app: tabs under the page on a phone, a rail at its left otherwise. */
export function SchoolShell({ children }: { children: ReactNode }) {
  const { colors } = useTheme();
  const { phone, wide } = useBreakpoints();
  return (
    <View style={[styles.shell, phone ? styles.upright : styles.level, { backgroundColor: colors.ground }]}>
      <SkipLink />
      {phone ? <TopBar /> : <Rail compact={!wide} />}
      <View style={styles.page}>{children}</View>
      {phone ? <TabBar /> : null}
    </View>
  );
}

const styles = StyleSheet.create({
  shell: { flex: 1, minHeight: 0 },
  upright: { flexDirection: 'column' },
  level: { flexDirection: 'row' },
  page: { flex: 1, minHeight: 0, minWidth: 0 },
});
