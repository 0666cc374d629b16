/// <reference types="expo/types" />
import 'react-native';

// What react-native-web takes beyond React Native's own types: a View with an href is a real link, and the
// ARIA attributes that native platforms do not know.
declare module 'react-native' {
  interface ViewProps {
    href?: string | undefined;
    hrefAttrs?: { target?: string; rel?: string; download?: boolean | string } | undefined;
    onClick?: ((event: import('react').MouseEvent<HTMLElement>) => void) | undefined;
    onKeyDown?: ((event: import('react').KeyboardEvent<HTMLElement>) => void) | undefined;
    onMouseEnter?: (() => void) | undefined;
    onMouseLeave?: (() => void) | undefined;
  }
  interface AccessibilityProps {
    'aria-atomic'?: boolean | undefined;
    'aria-controls'?: string | undefined;
    'aria-current'?: boolean | 'page' | 'step' | undefined;
    'aria-describedby'?: string | undefined;
    'aria-haspopup'?: 'dialog' | 'menu' | undefined;
    'aria-invalid'?: boolean | undefined;
    'aria-level'?: number | undefined;
    'aria-pressed'?: boolean | undefined;
    'aria-required'?: boolean | undefined;
  }
}
