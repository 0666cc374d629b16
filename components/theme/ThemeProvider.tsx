import { createContext, useContext, useEffect, useMemo, useState, type ReactNode } from 'react';
import { applyDocumentStyles } from './documentStyles';
import { useMediaQuery } from './media';
import { readSchemeChoice, storeSchemeChoice, type SchemeChoice } from './schemeChoice';
import { createThemeAtoms, type ThemeAtoms } from './themeAtoms';
import { themes, type Colors, type SchemeName } from './themes';

export interface ThemeContext {
  name: SchemeName;
  colors: Colors;
  /** Styles that carry the scheme's colours: `t.atoms.sheet`, `t.atoms.textSoft` … */
  atoms: ThemeAtoms;
  choice: SchemeChoice;
  choose: (choice: SchemeChoice) => void;
}

const Context = createContext<ThemeContext | null>(null);

const themeAtoms = { light: createThemeAtoms(themes.light), dark: createThemeAtoms(themes.dark) };

/** Follows the system's scheme unless the person chose one; `scheme` fixes it (tests, and parts that are always dark). */
export function ThemeProvider({ children, scheme }: { children: ReactNode; scheme?: SchemeName }) {
  const systemIsDark = useMediaQuery('(prefers-color-scheme: dark)');
  const [choice, setChoice] = useState<SchemeChoice>(readSchemeChoice);
  const name = scheme ?? (choice === 'system' ? (systemIsDark ? 'dark' : 'light') : choice);

  useEffect(() => applyDocumentStyles(themes[name]), [name]);

  const value = useMemo<ThemeContext>(
    () => ({
      name,
      colors: themes[name].colors,
      atoms: themeAtoms[name],
      choice,
      choose: (next) => {
        storeSchemeChoice(next);
        setChoice(next);
      },
    }),
    [name, choice],
  );
  return <Context.Provider value={value}>{children}</Context.Provider>;
}

export function useTheme(): ThemeContext {
  const theme = useContext(Context);
  if (!theme) throw new Error('useTheme needs a ThemeProvider above it');
  return theme;
}
