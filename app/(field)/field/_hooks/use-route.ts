'use client';
import { useCallback, useSyncExternalStore } from 'react';
import { parsePath, pathOf } from '../_shell/router';
import type { FieldRoute } from '../_shell/router';

const MOVED = 'lammas:moved';

function subscribe(listener: () => void): () => void {
  window.addEventListener('popstate', listener);
  window.addEventListener(MOVED, listener);
  return () => {
    window.removeEventListener('popstate', listener);
    window.removeEventListener(MOVED, listener);
  };
}

/** The route by the address bar, and a way to move that asks no server. */
export function useRoute(): { readonly route: FieldRoute; readonly go: (route: FieldRoute, options?: { replace?: boolean }) => void } {
  const path = useSyncExternalStore(subscribe, () => window.location.pathname, () => '/field');
  const go = useCallback((route: FieldRoute, { replace = false }: { replace?: boolean } = {}) => {
    const target = pathOf(route);
    if (target !== window.location.pathname) window.history[replace ? 'replaceState' : 'pushState'](null, '', target);
    window.dispatchEvent(new Event(MOVED));
    window.scrollTo(0, 0);
  }, []);
  return { route: parsePath(path), go };
}
