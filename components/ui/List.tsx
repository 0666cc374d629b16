import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { size, space, useTheme } from '@/components/theme';
import { Icon } from './Icon';
import { LinkBox, type To } from './Link';
import { Text } from './Text';

/** A list, read aloud as one. `label` names it. */
export function List({ label, children }: { label: string; children: ReactNode }) {
  return (
    <View role="list" aria-label={label} style={styles.list}>
      {children}
    </View>
  );
}

export interface ListRowProps {
  title: string;
  /** Under the title: text, or a node such as a Reading. */
  detail?: ReactNode;
  /** Before the words: an emblem, a slot letter. */
  before?: ReactNode;
  /** After the words: a badge, an amount. */
  after?: ReactNode;
  /** Makes the whole row a link. */
  to?: To;
  chosen?: boolean;
  /** False leaves out the line under the row (the last one of a sheet). */
  rule?: boolean;
  /** Space at the sides, for rows in a Card with `padded={false}`. */
  inset?: boolean;
  children?: ReactNode;
}

/** One line of a list. */
export function ListRow({ title, detail, before, after, to, chosen, rule = true, inset = false, children }: ListRowProps) {
  const t = useTheme();
  const face = (
    <>
      {before}
      <View style={styles.words}>
        <Text strong>{title}</Text>
        {typeof detail === 'string' ? (
          <Text size="quiet" tone="soft">
            {detail}
          </Text>
        ) : (
          detail
        )}
        {children}
      </View>
      {after}
      {to ? <Icon name="chevron" colour={t.colors.soft} /> : null}
    </>
  );
  const look = [styles.row, inset && styles.inset, chosen && t.atoms.chosen];
  return (
    <View role="listitem" style={rule && t.atoms.ruleBottom}>
      {to ? (
        <LinkBox to={to} current={chosen ?? false} style={look} hoverStyle={{ backgroundColor: t.colors.quietGround }}>
          {face}
        </LinkBox>
      ) : (
        <View style={look}>{face}</View>
      )}
    </View>
  );
}

const styles = StyleSheet.create({
  list: { margin: 0, padding: 0 },
  row: { flexDirection: 'row', alignItems: 'center', gap: space.md, minHeight: size.target + 12, paddingVertical: space.sm },
  inset: { paddingHorizontal: space.side },
  words: { flex: 1, minWidth: 0, gap: space.xxs },
});
