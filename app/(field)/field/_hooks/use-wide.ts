'use client';
import { useSyncExternalStore } from 'react';

const query = '(min-width: 900px)';
const subscribe = (listener: () => void) => {
  const media = window.matchMedia(query);
  media.addEventListener('change', listener);
  return () => media.removeEventListener('change', listener);
};

/** Whether the list and the card fit beside each other. */
export function useWide(): boolean {
  return useSyncExternalStore(subscribe, () => window.matchMedia(query).matches, () => false);
}
