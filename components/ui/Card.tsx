import type { ReactNode } from 'react';
import { View, type StyleProp, type ViewStyle } from 'react-native';
import { space, useTheme, type Space } from '@/components/theme';
import { Heading } from './Text';

export interface CardProps {
  title?: string;
  /** Level of the title in the page's outline. */
  level?: 2 | 3;
  /** Coloured edge for the state that the card is about. */
  edge?: 'none' | 'same' | 'open' | 'different';
  gap?: Space;
  /** False when rows inside bring their own sides. */
  padded?: boolean;
  children?: ReactNode;
  style?: StyleProp<ViewStyle>;
}

/** A sheet: 14 px corners, no shadow. With a title it is a named region. */
export function Card({ title, level = 2, edge = 'none', gap = 'md', padded = true, children, style }: CardProps) {
  const t = useTheme();
  return (
    <View
      {...(title ? { role: 'region' as const, 'aria-label': title } : {})}
      style={[t.atoms.sheet, edge !== 'none' && edgeOf(t.atoms)[edge], { gap: space[gap], padding: padded ? space.side : 0, overflow: 'hidden' }, style]}
    >
      {title ? (
        <Heading level={level} look="section" style={padded ? null : { paddingHorizontal: space.side, paddingTop: space.side }}>
          {title}
        </Heading>
      ) : null}
      {children}
    </View>
  );
}

function edgeOf(atoms: ReturnType<typeof useTheme>['atoms']) {
  return { same: atoms.edgeSame, open: atoms.edgeOpen, different: atoms.edgeDifferent };
}
