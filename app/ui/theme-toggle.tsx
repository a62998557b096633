import type { ThemeChoice } from '../lib/theme.ts';
import { chooseTheme, useThemeChoice } from '../lib/theme.ts';

const CHOICES: readonly { readonly value: ThemeChoice; readonly label: string }[] = [
  { value: 'system', label: 'As the device' },
  { value: 'light', label: 'Light' },
  { value: 'dark', label: 'Dark' },
];

/** Light, dark, or as the device has it; kept on this device. */
export function ThemeToggle() {
  const choice = useThemeChoice();
  return (
    <fieldset className="theme">
      <legend className="sr-only">Theme</legend>
      {CHOICES.map(({ value, label }) => (
        <label key={value} className="stroke" aria-current={choice === value ? 'true' : undefined}>
          <input
            type="radio"
            name="theme"
            className="sr-only"
            checked={choice === value}
            onChange={() => chooseTheme(value)}
          />
          {label}
        </label>
      ))}
    </fieldset>
  );
}
