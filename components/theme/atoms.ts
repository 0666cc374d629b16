import { StyleSheet } from 'react-native';
import { family, radius, size, space, type } from './tokens';

/** Styles that never depend on the scheme. Order in a style list: layout, spacing, text, theme colours, raw. */
export const atoms = StyleSheet.create({
  fill: { flex: 1 },
  grow: { flexGrow: 1 },
  shrink: { flexShrink: 1 },
  row: { flexDirection: 'row' },
  wrap: { flexWrap: 'wrap' },
  centre: { alignItems: 'center' },
  centreAll: { alignItems: 'center', justifyContent: 'center' },
  start: { alignItems: 'flex-start' },
  baseline: { alignItems: 'baseline' },
  between: { justifyContent: 'space-between' },
  end: { justifyContent: 'flex-end' },
  selfStart: { alignSelf: 'flex-start' },
  full: { width: '100%' },
  measure: { maxWidth: size.measure, width: '100%' },
  column: { maxWidth: size.column, width: '100%' },
  target: { minHeight: size.target, minWidth: size.target },

  gapXxs: { gap: space.xxs },
  gapXs: { gap: space.xs },
  gapSm: { gap: space.sm },
  gapMd: { gap: space.md },
  gapLg: { gap: space.lg },
  gapXl: { gap: space.xl },

  padSm: { padding: space.sm },
  padMd: { padding: space.md },
  padSide: { padding: space.side },
  padXSide: { paddingHorizontal: space.side },
  padYSm: { paddingVertical: space.sm },
  padYMd: { paddingVertical: space.md },

  sheetCorners: { borderRadius: radius.sheet },
  pill: { borderRadius: radius.pill },

  textDisplay: { ...type.display, fontFamily: family.heading },
  textHeading: { ...type.heading, fontFamily: family.heading },
  textSection: { ...type.section, fontFamily: family.heading },
  textText: { ...type.text, fontFamily: family.text },
  textQuiet: { ...type.quiet, fontFamily: family.text },
  textSmall: { ...type.small, fontFamily: family.text },
  textFigure: { ...type.figure, fontFamily: family.mono },
  strong: { fontFamily: family.textStrong },
  mono: { fontFamily: family.mono, fontVariant: ['tabular-nums'] },
  monoStrong: { fontFamily: family.monoStrong, fontVariant: ['tabular-nums'] },
  right: { textAlign: 'right' },
  centred: { textAlign: 'center' },

  /** Seen by a screen reader only. */
  unseen: { position: 'absolute', width: 1, height: 1, overflow: 'hidden', clip: 'rect(0 0 0 0)', margin: -1, padding: 0, borderWidth: 0 },
});
