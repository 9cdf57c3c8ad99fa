'use client';
import { useEffect, useState } from 'react';

/**
 * Registers the worker and tells when a new version waits. `use` lets it in and loads it; the caller offers that only
 * when no entry is open.
 */
export function useUpdate(): { readonly waiting: boolean; readonly use: () => void } {
  const [use, setUse] = useState<(() => void) | null>(null);
  useEffect(() => {
    if (process.env.NODE_ENV !== 'production' || !('serviceWorker' in navigator)) return;
    let gone = false;
    void import('@serwist/window').then(async ({ Serwist }) => {
      if (gone) return;
      const worker = new Serwist('/sw.js', { scope: '/field', updateViaCache: 'none' });
      worker.addEventListener('waiting', () => {
        setUse(() => () => {
          worker.addEventListener('controlling', () => window.location.reload());
          worker.messageSkipWaiting();
        });
      });
      await worker.register({ immediate: true });
    }).catch((error: unknown) => {
      // Without a network the script cannot be compared; the worker at hand goes on.
      console.info('The worker was not looked up:', error);
    });
    return () => {
      gone = true;
    };
  }, []);
  return { waiting: use !== null, use: () => use?.() };
}
