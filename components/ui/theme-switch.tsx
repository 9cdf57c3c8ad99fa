'use client';
import { useEffect, useSyncExternalStore } from 'react';

const KEY = 'lammas-theme';
const CHANGED = 'lammas-theme-changed';

function subscribe(changed: () => void): () => void {
  window.addEventListener(CHANGED, changed);
  window.addEventListener('storage', changed);
  return () => {
    window.removeEventListener(CHANGED, changed);
    window.removeEventListener('storage', changed);
  };
}

/** Paper by day, dusk by lamp; kept on this device. */
export function ThemeSwitch() {
  const dusk = useSyncExternalStore(subscribe, () => localStorage.getItem(KEY) === 'dusk', () => false);
  useEffect(() => {
    if (dusk) document.documentElement.setAttribute('data-theme', 'dusk');
    else document.documentElement.removeAttribute('data-theme');
  }, [dusk]);
  const change = () => {
    localStorage.setItem(KEY, dusk ? 'paper' : 'dusk');
    window.dispatchEvent(new Event(CHANGED));
  };
  return <button type="button" onClick={change} aria-pressed={dusk} className="min-h-10 cursor-pointer px-2 underline decoration-bronze underline-offset-4">Dusk</button>;
}
