import { useState } from 'preact/hooks';

export type Theme = 'day' | 'night' | 'red';
export const THEMES: Theme[] = ['day', 'night', 'red'];

/** Also read by public/first-paint.js, before anything is drawn. */
const KEY = 'duskround.theme';

function chosen(): Theme | null {
  const theme = document.documentElement.dataset.theme;
  return THEMES.find((known) => known === theme) ?? null;
}

function choose(theme: Theme | null): void {
  if (theme) document.documentElement.dataset.theme = theme;
  else delete document.documentElement.dataset.theme;
  try {
    if (theme) localStorage.setItem(KEY, theme);
    else localStorage.removeItem(KEY);
  } catch {
    // A browser that keeps nothing: the choice lasts as long as the page.
  }
}

/** The chosen theme, null = as the device says; choosing the chosen one again gives it back to the device. */
export function useTheme(): [Theme | null, (theme: Theme) => void] {
  const [theme, setTheme] = useState(chosen);
  return [
    theme,
    (next) => {
      const wanted = next === theme ? null : next;
      choose(wanted);
      setTheme(wanted);
    },
  ];
}
