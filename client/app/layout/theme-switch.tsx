import { Moon, Sun } from 'lucide-react';
import { chooseTheme, useTheme } from '../../lib/use-theme.ts';

/** Day and night bench; the choice is remembered in this browser. */
export function ThemeSwitch() {
  const theme = useTheme();
  const next = theme === 'dark' ? 'light' : 'dark';
  const Sign = theme === 'dark' ? Sun : Moon;
  return (
    <button
      type="button"
      onClick={() => chooseTheme(next)}
      className="inline-flex min-h-11 items-center gap-2 font-strong text-spruce underline decoration-[1.5px] underline-offset-4"
    >
      <Sign aria-hidden="true" className="size-4" />
      {theme === 'dark' ? 'Day light' : 'Night bench'}
    </button>
  );
}
