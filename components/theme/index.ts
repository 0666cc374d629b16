export { atoms as a } from './atoms';
export { useBreakpoints, useMediaQuery, useReducedMotion, type Breadth, type Breakpoints } from './media';
export { type SchemeChoice } from './schemeChoice';
export { ThemeProvider, useTheme, type ThemeContext } from './ThemeProvider';
export { type Colors, type SchemeName } from './themes';
export { family, motion, radius, size, space, type, type Space, type TypeSize } from './tokens';
