/**
 * Raw tokens: the only place where a colour, a gap or a size is spelled out.
 * Screens never import this file; they use the atoms and `useTheme()`.
 */

/** Gaps in CSS pixels. `side` is the phone's side margin and the default padding of a sheet. */
export const space = { none: 0, xxs: 2, xs: 4, sm: 8, md: 12, lg: 16, side: 18, xl: 24, xxl: 36, huge: 56 } as const;

export type Space = keyof typeof space;

export const radius = { sm: 8, button: 11, sheet: 14, pill: 999 } as const;

/** Sizes that accessibility or the hand decides, CSS pixels. */
export const size = {
  /** Smallest side of anything that can be pressed (WCAG 2.2 SC 2.5.5, AAA). */
  target: 44,
  /** Height of the one main action of a screen. */
  mainAction: 52,
  /** Longest line of running text: about 68 characters at 16 px. */
  measure: 600,
  /** One column of a form or of a phone screen shown wide. */
  column: 640,
  rail: 208,
  sidePane: 400,
  tabBar: 66,
} as const;

/** Type scale: font size and line height, CSS pixels. */
export const type = {
  display: { fontSize: 34, lineHeight: 40 },
  heading: { fontSize: 27, lineHeight: 33 },
  section: { fontSize: 18, lineHeight: 24 },
  text: { fontSize: 16, lineHeight: 23 },
  quiet: { fontSize: 14.5, lineHeight: 21 },
  small: { fontSize: 13, lineHeight: 18 },
  /** The number that is being typed on the bench keypad. */
  figure: { fontSize: 40, lineHeight: 46 },
} as const;

export type TypeSize = keyof typeof type;

const systemSans = 'system-ui, -apple-system, "Segoe UI", Roboto, sans-serif';

/** Families with a fallback each, so that words can be read before the fonts have come. */
export const family = {
  heading: `BricolageGrotesque_700Bold, ${systemSans}`,
  text: `AtkinsonHyperlegibleNext_400Regular, ${systemSans}`,
  textStrong: `AtkinsonHyperlegibleNext_700Bold, ${systemSans}`,
  mono: 'SplineSansMono_400Regular, ui-monospace, Menlo, Consolas, monospace',
  monoStrong: 'SplineSansMono_600SemiBold, ui-monospace, Menlo, Consolas, monospace',
} as const;

/** Movement in milliseconds; nothing lasts longer than 200. */
export const motion = { quick: 120, calm: 180 } as const;

export const palette = {
  paper: '#EDF0F1',
  white: '#FFFFFF',
  ink: '#16141D',
  soft: '#565B66',
  rule: '#CFD5DA',
  field: '#0B0A10',
  green: '#0A6B4E',
  greenPale: '#DDF2E8',
  amber: '#7A4D00',
  amberPale: '#FFEFC9',
  red: '#A8152F',
  redPale: '#FCE1E4',
  blue: '#2B2A86',
  bluePale: '#E4E5FA',
  // The darkroom: the same roles with the lights down.
  night: '#121018',
  nightSheet: '#1D1B26',
  nightSoft: '#A9AFBA',
  nightRule: '#3A3746',
  nightField: '#050408',
  greenLit: '#7EDDB6',
  greenDeep: '#0F3529',
  amberLit: '#F4C770',
  amberDeep: '#3B2A08',
  redLit: '#FFA3AF',
  redDeep: '#47131E',
  blueLit: '#BBBBFF',
  blueDeep: '#27265A',
} as const;
