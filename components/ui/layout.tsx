import type { ReactNode } from 'react';
import { View, type StyleProp, type ViewProps, type ViewStyle } from 'react-native';
import { space, type Space } from '@/components/theme';

interface BoxProps extends Omit<ViewProps, 'style'> {
  children?: ReactNode;
  gap?: Space;
  pad?: Space;
  style?: StyleProp<ViewStyle>;
}

/** Children one under another. */
export function Stack({ gap = 'md', pad, style, ...rest }: BoxProps) {
  return <View {...rest} style={[{ gap: space[gap] }, pad && { padding: space[pad] }, style]} />;
}

interface RowProps extends BoxProps {
  align?: 'flex-start' | 'center' | 'baseline' | 'stretch' | 'flex-end';
  justify?: 'flex-start' | 'space-between' | 'center' | 'flex-end';
  wrap?: boolean;
}

/** Children side by side. */
export function Row({ gap = 'md', pad, align = 'center', justify = 'flex-start', wrap, style, ...rest }: RowProps) {
  return (
    <View
      {...rest}
      style={[
        { flexDirection: 'row', alignItems: align, justifyContent: justify, gap: space[gap] },
        wrap && { flexWrap: 'wrap' },
        pad && { padding: space[pad] },
        style,
      ]}
    />
  );
}
