import type { ReactNode, Ref } from 'react';
import { Text as NativeText, type StyleProp, type TextStyle } from 'react-native';
import { a, useTheme } from '@/components/theme';

export type Tone = 'ink' | 'soft' | 'same' | 'open' | 'different' | 'action' | 'onField' | 'softOnField' | 'inherit';

export interface TextProps {
  children?: ReactNode;
  size?: 'text' | 'quiet' | 'small';
  tone?: Tone;
  strong?: boolean;
  align?: 'left' | 'centre' | 'right';
  /** One line, cut with an ellipsis. */
  oneLine?: boolean;
  id?: string | undefined;
  role?: 'listitem' | 'status' | 'alert';
  'aria-hidden'?: boolean;
  style?: StyleProp<TextStyle>;
}

/** Running text. `tone="inherit"` takes the colour of a Text around it. */
export function Text({ children, size = 'text', tone = 'ink', strong, align, oneLine, style, ...rest }: TextProps) {
  const toneStyle = useTone(tone);
  return (
    <NativeText
      {...rest}
      {...(oneLine ? { numberOfLines: 1 } : {})}
      style={[sizes[size], strong && a.strong, align && aligns[align], toneStyle, style]}
    >
      {children}
    </NativeText>
  );
}

/** Readings, codes, amounts: fixed width, so that digits line up. */
export function Mono({ children, size = 'text', tone = 'ink', strong, align, oneLine, style, ...rest }: TextProps) {
  const toneStyle = useTone(tone);
  return (
    <NativeText
      {...rest}
      {...(oneLine ? { numberOfLines: 1 } : {})}
      style={[sizes[size], strong ? a.monoStrong : a.mono, align && aligns[align], toneStyle, style]}
    >
      {children}
    </NativeText>
  );
}

export interface HeadingProps {
  children?: ReactNode;
  /** 1: the page's one heading (PageFrame writes it). 2: a section. 3: a part of a section. */
  level?: 1 | 2 | 3;
  look?: 'display' | 'heading' | 'section' | 'text';
  tone?: Tone;
  id?: string | undefined;
  /** Lets the page frame move the focus here after navigation. */
  focusable?: boolean;
  ref?: Ref<NativeText>;
  style?: StyleProp<TextStyle>;
}

const lookOfLevel = { 1: 'heading', 2: 'section', 3: 'text' } as const;

export function Heading({ children, level = 2, look = lookOfLevel[level], tone = 'ink', focusable, style, ...rest }: HeadingProps) {
  const toneStyle = useTone(tone);
  return (
    <NativeText
      {...rest}
      role="heading"
      aria-level={level}
      {...(focusable ? { tabIndex: -1 } : {})}
      style={[looks[look], toneStyle, style]}
    >
      {children}
    </NativeText>
  );
}

function useTone(tone: Tone): TextStyle | undefined {
  const { colors } = useTheme();
  return tone === 'inherit' ? undefined : { color: colors[tone] };
}

const sizes = { text: a.textText, quiet: a.textQuiet, small: a.textSmall };
const looks = { display: a.textDisplay, heading: a.textHeading, section: a.textSection, text: [a.textText, a.strong] };
const aligns = { left: { textAlign: 'left' }, centre: a.centred, right: a.right } as const;
