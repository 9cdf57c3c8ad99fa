'use client';
import { Icon } from '@/components/ui/icon';
import { useField } from './field-context';

/** Paper by day, dusk by a head torch. */
export function ThemeToggle() {
  const { theme, setTheme } = useField();
  const other = theme === 'paper' ? 'dusk' : 'paper';
  return (
    <button
      type="button" aria-label={`Theme: ${theme}. Change to ${other}`} onClick={() => setTheme(other)}
      className="grid min-h-target min-w-target cursor-pointer place-items-center rounded-lg text-ink active:bg-paper-sunk"
    >
      <Icon name="theme" />
    </button>
  );
}
