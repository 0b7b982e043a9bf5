import { createContext, useCallback, useContext, useEffect, useMemo, useState, type ReactNode } from 'react';
import { Platform, useColorScheme } from 'react-native';
import { fonts, themes, typeScale, type Colors, type ThemeName } from './tokens';

/** 'system' follows the machine; the other two are the person's own choice, kept in this browser. */
export type ThemeChoice = 'system' | ThemeName;
export interface Theme {
  name: ThemeName;
  color: Colors;
  choice: ThemeChoice;
  choose: (choice: ThemeChoice) => void;
}

const KEY = 'outswell.theme';
const Context = createContext<Theme | null>(null);

function stored(): ThemeChoice {
  try {
    const value = globalThis.localStorage?.getItem(KEY);
    return value === 'paper' || value === 'dome' ? value : 'system';
  } catch {
    return 'system'; // storage may be forbidden
  }
}

export function ThemeProvider({ children, initial }: { children: ReactNode; initial?: ThemeChoice }) {
  const system = useColorScheme();
  const [choice, setChoice] = useState<ThemeChoice>(() => initial ?? stored());
  const name: ThemeName = choice === 'system' ? (system === 'dark' ? 'dome' : 'paper') : choice;

  const choose = useCallback((next: ThemeChoice) => {
    setChoice(next);
    try {
      if (next === 'system') globalThis.localStorage?.removeItem(KEY);
      else globalThis.localStorage?.setItem(KEY, next);
    } catch {
      /* the choice then lasts until the page is left */
    }
  }, []);

  useEffect(() => {
    if (Platform.OS === 'web') paintDocument(name);
  }, [name]);

  const theme = useMemo<Theme>(() => ({ name, color: themes[name], choice, choose }), [name, choice, choose]);
  return <Context.Provider value={theme}>{children}</Context.Provider>;
}

export function useTheme(): Theme {
  const theme = useContext(Context);
  if (!theme) throw new Error('useTheme needs a ThemeProvider above it.');
  return theme;
}

/** What no component can style: the page's ground, native controls, the focus ring, and motion for who wants none. */
function paintDocument(name: ThemeName) {
  const c = themes[name];
  const id = 'outswell-theme';
  const style = document.getElementById(id) ?? document.head.appendChild(document.createElement('style'));
  style.id = id;
  const [size] = typeScale.body;
  style.textContent = `
    html, body { background: ${c.ground}; color-scheme: ${name === 'dome' ? 'dark' : 'light'}; }
    body { font-family: ${fonts.regular}, system-ui, sans-serif; font-size: ${size}px; }
    :focus { outline: none; }
    :focus-visible { outline: 2px solid ${c.focus}; outline-offset: 2px; border-radius: 4px; }
    main:focus-visible { outline: none; }
    ::placeholder { color: ${c.quiet}; opacity: 1; }
    ::selection { background: ${c.personWash}; color: ${c.text}; }
    * { scrollbar-color: ${c.control} transparent; scrollbar-width: thin; }
    @media (prefers-reduced-motion: reduce) {
      *, *::before, *::after { animation-duration: 1ms !important; transition-duration: 1ms !important; }
    }`;
  document.documentElement.lang = 'en';
  let meta = document.querySelector<HTMLMetaElement>('meta[name="theme-color"]');
  if (!meta) {
    meta = document.head.appendChild(document.createElement('meta'));
    meta.name = 'theme-color';
  }
  meta.content = c.ground;
  // phones with rounded corners and notches: the page reaches under them, its frame keeps clear (`inset`)
  const lens = document.querySelector<HTMLMetaElement>('meta[name="viewport"]');
  if (lens && !lens.content.includes('viewport-fit')) lens.content += ', viewport-fit=cover';
}
