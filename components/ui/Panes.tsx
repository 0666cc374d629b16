import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { size, useBreakpoints, useTheme } from '@/components/theme';

export interface PanesProps {
  /** A PageFrame; hidden on a phone while the detail is open. */
  list: ReactNode;
  /** The chosen thing. On a phone it takes the whole page and brings its own PageFrame. */
  detail: ReactNode;
  detailOpen: boolean;
  detailLabel: string;
}

/** List and chosen thing beside each other from 700 px on; with the shell's rail these are the three panes of a wide window. */
export function Panes({ list, detail, detailOpen, detailLabel }: PanesProps) {
  const t = useTheme();
  const { phone, wide } = useBreakpoints();
  if (phone) return <View style={styles.fill}>{detailOpen ? detail : list}</View>;
  return (
    <View style={styles.panes}>
      <View style={styles.fill}>{list}</View>
      {detailOpen ? (
        <View role="complementary" aria-label={detailLabel} style={[styles.detail, t.atoms.sheetFlat, t.atoms.ruleLeft, { width: wide ? size.sidePane : 340 }]}>
          {detail}
        </View>
      ) : null}
    </View>
  );
}

const styles = StyleSheet.create({
  fill: { flex: 1, minWidth: 0, minHeight: 0 },
  panes: { flex: 1, flexDirection: 'row', minHeight: 0 },
  detail: { flexShrink: 0, minHeight: 0 },
});
