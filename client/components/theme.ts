import { storedChoice } from './stored-choice';

export const THEME_CHOICES = ['system', 'paper', 'night', 'dome'] as const;
export type ThemeChoice = (typeof THEME_CHOICES)[number];

/** The chosen theme; public/theme.js reads the same key before the first paint. */
export const themeChoice = storedChoice<ThemeChoice>('theme', THEME_CHOICES, 'system');

/** Keeps `data-theme` of the page at the choice, and with 'system' at what the system says. Returns the stop. */
export function followTheme(): () => void {
  const dark = window.matchMedia('(prefers-color-scheme: dark)');
  const apply = () => {
    const choice = themeChoice.get();
    document.documentElement.dataset.theme = choice !== 'system' ? choice : dark.matches ? 'night' : 'paper';
  };
  apply();
  // Paper prints, whatever the theme on the screen.
  const forPrint = () => {
    document.documentElement.dataset.theme = 'paper';
  };
  dark.addEventListener('change', apply);
  window.addEventListener('beforeprint', forPrint);
  window.addEventListener('afterprint', apply);
  const stop = themeChoice.subscribe(apply);
  return () => {
    dark.removeEventListener('change', apply);
    window.removeEventListener('beforeprint', forPrint);
    window.removeEventListener('afterprint', apply);
    stop();
  };
}
