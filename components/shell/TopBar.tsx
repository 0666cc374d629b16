import { useState } from 'react';
import { Pressable, StyleSheet, View } from 'react-native';
import { useSession } from '@/components/api';
import { size, space, useTheme } from '@/components/theme';
import { InterferenceStrip } from '@/components/ui/InterferenceStrip';
import { Text } from '@/components/ui/Text';
import { AccountDialog } from './AccountDialog';
import { initialsOf } from './initials';
import { Wordmark } from './Wordmark';

/** Over the page on a phone: the name, the school, the way to one's own account. */
export function TopBar() {
  const { colors } = useTheme();
  const { account, school } = useSession();
  const [open, setOpen] = useState(false);
  return (
    <View role="banner">
      <InterferenceStrip height={5} />
      <View style={[styles.row, { backgroundColor: colors.ground }]}>
        <Wordmark />
        <Text size="quiet" tone="soft" oneLine style={styles.school}>
          {school?.schoolName}
        </Text>
        <Pressable role="button" aria-label={`Your account: ${account?.name ?? ''}`} aria-haspopup="dialog" aria-expanded={open} onPress={() => setOpen(true)} style={styles.account}>
          <View style={[styles.disc, { backgroundColor: colors.field }]}>
            <Text size="small" strong tone="onField">
              {initialsOf(account?.name ?? '')}
            </Text>
          </View>
        </Pressable>
      </View>
      <AccountDialog open={open} onClose={() => setOpen(false)} />
    </View>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', alignItems: 'center', gap: space.md, paddingLeft: space.side, paddingRight: space.sm, minHeight: 48 },
  school: { flex: 1, textAlign: 'right' },
  account: { minWidth: size.target, minHeight: size.target, alignItems: 'center', justifyContent: 'center' },
  disc: { width: 32, height: 32, borderRadius: 16, alignItems: 'center', justifyContent: 'center' },
});
