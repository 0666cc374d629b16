import { palette as p } from './tokens';

/** The colours a screen may ask for, by what they mean. */
export interface Colors {
  ground: string;
  sheet: string;
  ink: string;
  soft: string;
  rule: string;
  /** Edge of an input or a secondary button: at least 3:1 on ground and sheet (WCAG 2.2 SC 1.4.11). */
  edge: string;
  field: string;
  onField: string;
  softOnField: string;
  /** Ground and text of the primary button. */
  solid: string;
  onSolid: string;
  same: string;
  sameGround: string;
  open: string;
  openGround: string;
  different: string;
  differentGround: string;
  action: string;
  actionGround: string;
  /** Ground of a neutral badge and of a chosen row. */
  quietGround: string;
  /** What lies between a dialog and the page under it. */
  veil: string;
}

export type SchemeName = 'light' | 'dark';

export interface Theme {
  name: SchemeName;
  colors: Colors;
}

const light: Colors = {
  ground: p.paper, sheet: p.white, ink: p.ink, soft: p.soft, rule: p.rule, edge: p.soft,
  field: p.field, onField: p.white, softOnField: p.rule,
  solid: p.ink, onSolid: p.white,
  same: p.green, sameGround: p.greenPale,
  open: p.amber, openGround: p.amberPale,
  different: p.red, differentGround: p.redPale,
  action: p.blue, actionGround: p.bluePale,
  quietGround: p.paper,
  veil: 'rgba(11, 10, 16, 0.55)',
};

const dark: Colors = {
  ground: p.night, sheet: p.nightSheet, ink: p.paper, soft: p.nightSoft, rule: p.nightRule, edge: p.nightSoft,
  field: p.nightField, onField: p.paper, softOnField: p.nightSoft,
  solid: p.paper, onSolid: p.ink,
  same: p.greenLit, sameGround: p.greenDeep,
  open: p.amberLit, openGround: p.amberDeep,
  different: p.redLit, differentGround: p.redDeep,
  action: p.blueLit, actionGround: p.blueDeep,
  quietGround: p.night,
  veil: 'rgba(0, 0, 0, 0.7)',
};

export const themes: Record<SchemeName, Theme> = {
  light: { name: 'light', colors: light },
  dark: { name: 'dark', colors: dark },
};

/** Every text colour with every ground it is ever put on. The contrast test walks this list. */
export const textPairs: readonly (readonly [text: keyof Colors, ground: keyof Colors])[] = [
  ['ink', 'ground'], ['ink', 'sheet'], ['ink', 'quietGround'],
  ['soft', 'ground'], ['soft', 'sheet'], ['soft', 'quietGround'],
  ['onField', 'field'], ['softOnField', 'field'], ['onSolid', 'solid'],
  ['same', 'sameGround'], ['same', 'sheet'], ['same', 'ground'],
  ['open', 'openGround'], ['open', 'sheet'], ['open', 'ground'],
  ['different', 'differentGround'], ['different', 'sheet'], ['different', 'ground'],
  ['action', 'actionGround'], ['action', 'sheet'], ['action', 'ground'],
  ['ink', 'sameGround'], ['ink', 'openGround'], ['ink', 'differentGround'], ['ink', 'actionGround'],
];

/** Edges of controls with the grounds they stand on: at least 3:1. */
export const edgePairs: readonly (readonly [edge: keyof Colors, ground: keyof Colors])[] = [
  ['edge', 'ground'], ['edge', 'sheet'], ['ink', 'sheet'], ['action', 'ground'], ['action', 'sheet'], ['onField', 'field'],
];
