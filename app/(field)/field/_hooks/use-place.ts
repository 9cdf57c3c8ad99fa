'use client';
import { useEffect } from 'react';
import type { FieldStore } from '@/lib/client/field-store-types';
import { pathOf } from '../_shell/router';
import type { FieldRoute } from '../_shell/router';

export const LAST_PLACE = 'last-place';

/** Keeps where the person is, so that the next start leads back there. */
export function usePlace(store: FieldStore | null, signedIn: boolean, route: FieldRoute): void {
  const path = pathOf(route);
  const keeps = route.name === 'project' || route.name === 'plot' || route.name === 'visit' || route.name === 'finish';
  useEffect(() => {
    if (!store || !signedIn || !keeps) return;
    // A place that could not be kept only costs a tap at the next start.
    store.setSetting(LAST_PLACE, path).catch((error: unknown) => console.warn('The place was not kept:', error));
  }, [store, signedIn, keeps, path]);
}
