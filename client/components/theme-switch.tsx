import { ChoiceField, type ChoiceOption } from './choice-field';
import { themeChoice, type ThemeChoice } from './theme';
import { useStoredChoice } from './use-stored-choice';

const OPTIONS: readonly ChoiceOption<ThemeChoice>[] = [
  { value: 'system', label: 'As the system' },
  { value: 'paper', label: 'Paper', hint: 'light' },
  { value: 'night', label: 'Night', hint: 'dark' },
  { value: 'dome', label: 'Dome', hint: 'dim red on black, beside a telescope' },
];

/** Chooses the theme. */
export function ThemeSwitch() {
  const [theme, setTheme] = useStoredChoice(themeChoice);
  return <ChoiceField legend="Theme" options={OPTIONS} value={theme} onChange={setTheme} />;
}
