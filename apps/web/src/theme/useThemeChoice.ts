import { useColorScheme } from '@mui/material/styles';

export type ThemeChoice = 'system' | 'paper' | 'slate' | 'dome';

/** Where the choice is kept; `public/first-paint.js` reads the same keys. */
export const modeStorageKey = 'faintward-mode';
export const schemeStorageKey = 'faintward-scheme';

/** The person's choice of scheme, and how to change it. It is kept in this browser. */
export function useThemeChoice(): { choice: ThemeChoice; choose: (choice: ThemeChoice) => void } {
  const { mode, darkColorScheme, setMode, setColorScheme } = useColorScheme();
  const choice: ThemeChoice =
    mode === 'light' ? 'paper' : mode === 'dark' ? (darkColorScheme === 'dome' ? 'dome' : 'slate') : 'system';
  return {
    choice,
    choose: (next) => {
      setColorScheme({ dark: next === 'dome' ? 'dome' : 'dark' });
      setMode(next === 'system' ? 'system' : next === 'paper' ? 'light' : 'dark');
    },
  };
}
