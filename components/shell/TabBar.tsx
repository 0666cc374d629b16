import { usePathname } from 'expo-router';
import { useState } from 'react';
import { Pressable, StyleSheet, View } from 'react-native';
import { useSession } from '@/components/api';
import { size, useTheme } from '@/components/theme';
import { LinkBox } from '@/components/ui/Link';
import { Text } from '@/components/ui/Text';
import { isWithin, phoneTabsFor } from './places';
import { MoreDialog } from './MoreDialog';
import { PlaceIcon } from './PlaceIcon';

/** The phone's tabs: real links, the present one marked by a dark field, bold word and `aria-current`. */
export function TabBar() {
  const t = useTheme();
  const { colors } = t;
  const pathname = usePathname();
  const { roles } = useSession();
  const { tabs, more } = phoneTabsFor(roles);
  const [open, setOpen] = useState(false);
  const inMore = more.some((place) => isWithin(place, pathname));
  return (
    <View role="navigation" aria-label="Places" style={[styles.bar, t.atoms.sheetFlat, t.atoms.ruleTop]}>
      {tabs.map((place) => {
        const current = isWithin(place, pathname);
        return (
          <LinkBox key={place.id} to={place.to} current={current} style={styles.tab}>
            <PlaceIcon id={place.id} chosen={current} ink={current ? colors.ink : colors.soft} ground={colors.sheet} />
            <Text size="small" strong={current} tone={current ? 'ink' : 'soft'} oneLine>
              {place.label}
            </Text>
          </LinkBox>
        );
      })}
      {more.length > 0 ? (
        <Pressable role="button" aria-label="More" aria-haspopup="dialog" aria-expanded={open} onPress={() => setOpen(true)} style={styles.tab}>
          <PlaceIcon id="more" chosen={inMore} ink={inMore ? colors.ink : colors.soft} ground={colors.sheet} />
          <Text size="small" strong={inMore} tone={inMore ? 'ink' : 'soft'}>
            More
          </Text>
        </Pressable>
      ) : null}
      <MoreDialog open={open} places={more} onClose={() => setOpen(false)} />
    </View>
  );
}

const styles = StyleSheet.create({
  bar: { flexDirection: 'row', minHeight: size.tabBar },
  tab: { flex: 1, alignItems: 'center', justifyContent: 'center', gap: 3, minHeight: size.target, paddingVertical: 6 },
});
