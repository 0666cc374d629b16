import { useState } from 'react';
import { a, radius, space, useTheme } from '@/components/theme';
import { unseen } from './Field';
import { Text } from './Text';

/** First stop of the Tab key: jumps over the tabs to the page's heading. Seen only while it has the focus. */
export function SkipLink() {
  const { colors } = useTheme();
  const [focused, setFocused] = useState(false);
  return (
    <a
      href="#main"
      onFocus={() => setFocused(true)}
      onBlur={() => setFocused(false)}
      onClick={(event) => {
        event.preventDefault();
        document.querySelector<HTMLElement>('#main h1')?.focus();
      }}
      style={focused ? { position: 'fixed', top: 8, left: 8, zIndex: 10, padding: space.md, borderRadius: radius.button, backgroundColor: colors.solid } : unseen}
    >
      <Text strong tone="inherit" style={[a.textText, { color: colors.onSolid }]}>
        Skip to the page
      </Text>
    </a>
  );
}
