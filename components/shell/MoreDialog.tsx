import { usePathname } from 'expo-router';
import { useEffect } from 'react';
import { StyleSheet, View } from 'react-native';
import { space, useTheme } from '@/components/theme';
import { Dialog } from '@/components/ui/Dialog';
import { LinkBox } from '@/components/ui/Link';
import { Text } from '@/components/ui/Text';
import { isWithin, type Place } from './places';
import { PlaceIcon } from './PlaceIcon';

/** The places that have no tab on a phone. Closes by itself once one is reached. */
export function MoreDialog({ open, places, onClose }: { open: boolean; places: readonly Place[]; onClose: () => void }) {
  const { colors } = useTheme();
  const pathname = usePathname();
  useEffect(onClose, [pathname]); // eslint-disable-line react-hooks/exhaustive-deps -- only a change of page closes it
  return (
    <Dialog open={open} onClose={onClose} title="More places">
      <View role="navigation" aria-label="More places">
        {places.map((place) => (
          <LinkBox key={place.id} to={place.to} current={isWithin(place, pathname)} style={styles.row}>
            <PlaceIcon id={place.id} chosen={isWithin(place, pathname)} ink={colors.ink} ground={colors.sheet} />
            <Text strong>{place.label}</Text>
          </LinkBox>
        ))}
      </View>
    </Dialog>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', alignItems: 'center', gap: space.md, minHeight: 52 },
});
