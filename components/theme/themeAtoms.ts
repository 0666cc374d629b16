import { StyleSheet } from 'react-native';
import { radius } from './tokens';
import type { Theme } from './themes';

/** Styles that carry colours of one scheme. Made once per scheme, shared by every component. */
export function createThemeAtoms({ colors: c }: Theme) {
  return StyleSheet.create({
    ground: { backgroundColor: c.ground },
    sheet: { backgroundColor: c.sheet, borderRadius: radius.sheet },
    sheetFlat: { backgroundColor: c.sheet },
    field: { backgroundColor: c.field },
    text: { color: c.ink },
    textSoft: { color: c.soft },
    textOnField: { color: c.onField },
    textSoftOnField: { color: c.softOnField },
    textSame: { color: c.same },
    textOpen: { color: c.open },
    textDifferent: { color: c.different },
    textAction: { color: c.action },
    ruleTop: { borderTopWidth: 1, borderTopColor: c.rule },
    ruleBottom: { borderBottomWidth: 1, borderBottomColor: c.rule },
    ruleLeft: { borderLeftWidth: 1, borderLeftColor: c.rule },
    ruleAll: { borderWidth: 1, borderColor: c.rule },
    edge: { borderWidth: 1.5, borderColor: c.edge },
    edgeDifferent: { borderWidth: 2, borderColor: c.different },
    edgeOpen: { borderWidth: 2, borderColor: c.open },
    edgeSame: { borderWidth: 2, borderColor: c.same },
    chosen: { backgroundColor: c.actionGround },
  });
}

export type ThemeAtoms = ReturnType<typeof createThemeAtoms>;
