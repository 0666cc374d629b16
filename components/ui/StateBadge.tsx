import { StyleSheet, View } from 'react-native';
import { radius, space, useTheme } from '@/components/theme';
import { Icon, type IconName } from './Icon';
import { Text, type Tone } from './Text';

/** `same` green tick, `open` amber half disc, `different` red cross, `out` blue arrow, `neutral` grey dot. */
export type BadgeState = 'same' | 'open' | 'different' | 'out' | 'neutral';

const shape: Record<BadgeState, IconName> = { same: 'check', open: 'half', different: 'cross', out: 'arrow', neutral: 'dot' };
const tone: Record<BadgeState, Tone> = { same: 'same', open: 'open', different: 'different', out: 'action', neutral: 'soft' };

/** A state by word, shape and colour together; never by colour alone. */
export function StateBadge({ state, label }: { state: BadgeState; label: string }) {
  const { colors } = useTheme();
  const ground = {
    same: colors.sameGround,
    open: colors.openGround,
    different: colors.differentGround,
    out: colors.actionGround,
    neutral: colors.quietGround,
  }[state];
  const colour = colors[tone[state] as 'same'];
  return (
    <View style={[styles.badge, { backgroundColor: ground }]}>
      <Icon name={shape[state]} colour={colour} size={13} />
      <Text size="small" strong tone={tone[state]}>
        {label}
      </Text>
    </View>
  );
}

const styles = StyleSheet.create({
  badge: {
    flexDirection: 'row',
    alignItems: 'center',
    // Neither stretched in a column nor moved in a row; React Native's types do not know the web's word.
    width: 'fit-content' as 'auto',
    gap: 5,
    paddingHorizontal: space.sm + 1,
    paddingVertical: 3,
    borderRadius: radius.pill,
  },
});
