'use client';
import { useCallback, useEffect, useState } from 'react';
import type { FieldStore } from '@/lib/client/field-store-types';
import type { Theme } from '../_shell/field-context';
import { THEME_KEY } from '../_shell/theme-script';

function show(theme: Theme): void {
  if (theme === 'dusk') document.documentElement.dataset.theme = 'dusk';
  else delete document.documentElement.dataset.theme;
  try {
    localStorage.setItem(THEME_KEY, theme);
  } catch {
    // Only the mirror for the first paint is lost; the store below still has it.
  }
}

/** The theme of this device, kept in its store and mirrored for the first paint. */
export function useTheme(store: FieldStore | null): { readonly theme: Theme; readonly setTheme: (theme: Theme) => void } {
  const [theme, set] = useState<Theme>('paper');
  useEffect(() => {
    if (!store) return;
    void store.setting('theme').then((kept) => {
      const known: Theme = kept === 'dusk' ? 'dusk' : 'paper';
      set(known);
      show(known);
    });
  }, [store]);
  const setTheme = useCallback((chosen: Theme) => {
    set(chosen);
    show(chosen);
    void store?.setSetting('theme', chosen);
  }, [store]);
  return { theme, setTheme };
}
