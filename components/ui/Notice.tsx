import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { radius, space, useTheme } from '@/components/theme';
import { Icon } from './Icon';
import { Heading, Text } from './Text';

export interface NoticeProps {
  /** `info` what to know, `caution` care for people or stones, `error` what went wrong, `done` what was achieved. */
  kind?: 'info' | 'caution' | 'error' | 'done';
  title?: string;
  children?: ReactNode;
  /** Read aloud when it appears. Errors always are. */
  live?: boolean;
}

/** A short word to the person, on a ground of its state. Text children are set as text. */
export function Notice({ kind = 'info', title, children, live }: NoticeProps) {
  const { colors } = useTheme();
  const look = {
    info: { ground: colors.actionGround, colour: colors.action, icon: 'info' },
    caution: { ground: colors.openGround, colour: colors.open, icon: 'caution' },
    error: { ground: colors.differentGround, colour: colors.different, icon: 'cross' },
    done: { ground: colors.sameGround, colour: colors.same, icon: 'check' },
  } as const;
  const { ground, colour, icon } = look[kind];
  const role = kind === 'error' ? 'alert' : live ? 'status' : undefined;
  return (
    <View {...(role ? { role } : {})} style={[styles.notice, { backgroundColor: ground }]}>
      <View style={styles.icon}>
        <Icon name={icon} colour={colour} />
      </View>
      <View style={styles.words}>
        {title ? (
          <Heading level={3} look="text">
            {title}
          </Heading>
        ) : null}
        {typeof children === 'string' ? <Text size="quiet">{children}</Text> : children}
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  notice: { flexDirection: 'row', gap: space.md, padding: space.lg, borderRadius: radius.sheet },
  icon: { paddingTop: 3 },
  words: { flex: 1, gap: space.xs },
});
