import { usePathname } from 'expo-router';
import { useState } from 'react';
import { Pressable, ScrollView, StyleSheet, View } from 'react-native';
import { useSession } from '@/components/api';
import { radius, size, space, useTheme } from '@/components/theme';
import { InterferenceStrip } from '@/components/ui/InterferenceStrip';
import { LinkBox } from '@/components/ui/Link';
import { Text } from '@/components/ui/Text';
import { AccountDialog } from './AccountDialog';
import { initialsOf } from './initials';
import { isWithin, placesFor, type Place } from './places';
import { PlaceIcon } from './PlaceIcon';
import { Wordmark } from './Wordmark';

/** At the left of a wide window: all places by name. `compact` shows drawings over small words, between phone and wide. */
export function Rail({ compact }: { compact: boolean }) {
  const { colors } = useTheme();
  const { roles } = useSession();
  return (
    <View style={[styles.rail, { width: compact ? 92 : size.rail, backgroundColor: colors.field }]}>
      {compact ? <InterferenceStrip height={5} /> : <RailHead />}
      <ScrollView style={styles.scroll}>
        <View role="navigation" aria-label="Places" style={[styles.places, compact && styles.placesCompact]}>
          {placesFor(roles).map((place) => (
            <RailPlace key={place.id} place={place} compact={compact} />
          ))}
        </View>
      </ScrollView>
      <RailAccount compact={compact} />
    </View>
  );
}

function RailHead() {
  const { school } = useSession();
  return (
    <View role="banner" style={styles.head}>
      <View style={styles.name}>
        <Wordmark onField large />
        <Text size="quiet" tone="softOnField">
          {school?.schoolName}
        </Text>
      </View>
      <InterferenceStrip height={4} />
    </View>
  );
}

function RailPlace({ place, compact }: { place: Place; compact: boolean }) {
  const { colors } = useTheme();
  const current = isWithin(place, usePathname());
  return (
    <LinkBox
      to={place.to}
      current={current}
      style={[compact ? styles.placeCompact : styles.place, current && { backgroundColor: chosenOnField }]}
      hoverStyle={{ backgroundColor: chosenOnField }}
    >
      {compact ? <PlaceIcon id={place.id} chosen={current} ink={colors.onField} ground={colors.field} /> : null}
      <Text size={compact ? 'small' : 'text'} strong={current} tone="onField" oneLine>
        {place.label}
      </Text>
    </LinkBox>
  );
}

function RailAccount({ compact }: { compact: boolean }) {
  const { colors } = useTheme();
  const { account } = useSession();
  const [open, setOpen] = useState(false);
  return (
    <View style={styles.foot}>
      <Pressable role="button" aria-label={`Your account: ${account?.name ?? ''}`} aria-haspopup="dialog" aria-expanded={open} onPress={() => setOpen(true)} style={styles.account}>
        <View style={[styles.disc, { backgroundColor: colors.onField }]}>
          <Text size="small" strong tone="inherit" style={{ color: colors.field }}>
            {initialsOf(account?.name ?? '')}
          </Text>
        </View>
        {compact ? null : (
          <Text tone="onField" oneLine style={styles.accountName}>
            {account?.name}
          </Text>
        )}
      </Pressable>
      <AccountDialog open={open} onClose={() => setOpen(false)} />
    </View>
  );
}

/** White at a low strength: the chosen place on the dark rail, in both schemes. */
const chosenOnField = 'rgba(255, 255, 255, 0.13)';

const styles = StyleSheet.create({
  rail: { flexShrink: 0 },
  head: { paddingTop: space.side, gap: space.sm },
  name: { paddingHorizontal: 22, gap: space.xxs },
  scroll: { flex: 1 },
  places: { padding: space.md, paddingTop: space.lg, gap: space.xs },
  placesCompact: { padding: space.sm },
  place: { justifyContent: 'center', paddingHorizontal: space.md, borderRadius: radius.sm },
  placeCompact: { alignItems: 'center', justifyContent: 'center', gap: space.xxs, paddingVertical: space.sm, borderRadius: radius.sm },
  foot: { padding: space.md },
  account: { flexDirection: 'row', alignItems: 'center', gap: space.md, minHeight: size.target, paddingHorizontal: space.sm },
  accountName: { flexShrink: 1 },
  disc: { width: 32, height: 32, borderRadius: 16, alignItems: 'center', justifyContent: 'center' },
});
