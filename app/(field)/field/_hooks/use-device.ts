'use client';
import { useCallback, useEffect, useState } from 'react';
import type { FieldStore, Identity } from '@/lib/client/field-store-types';

export type DeviceState =
  | { readonly kind: 'opening' }
  | { readonly kind: 'failed'; readonly reason: string }
  | { readonly kind: 'open'; readonly store: FieldStore; readonly identity: Identity | null };

/** Opens the device's store and reads who signed in on it. No session, no network. */
export function useDevice(): { readonly device: DeviceState; readonly setIdentity: (identity: Identity | null) => Promise<void>; readonly retry: () => void } {
  const [device, setDevice] = useState<DeviceState>({ kind: 'opening' });
  const [turn, setTurn] = useState(0);
  useEffect(() => {
    let gone = false;
    const open = async () => {
      const { openFieldStore } = await import('@/lib/client/field-store');
      const store = await openFieldStore();
      const identity = await store.currentIdentity();
      if (!gone) setDevice({ kind: 'open', store, identity });
    };
    open().catch((error: unknown) => {
      if (!gone) setDevice({ kind: 'failed', reason: error instanceof Error ? error.message : String(error) });
    });
    return () => {
      gone = true;
    };
  }, [turn]);
  const store = device.kind === 'open' ? device.store : null;
  const setIdentity = useCallback(async (identity: Identity | null) => {
    if (!store) return;
    await store.setIdentity(identity);
    setDevice({ kind: 'open', store, identity });
  }, [store]);
  const retry = useCallback(() => {
    setDevice({ kind: 'opening' });
    setTurn((before) => before + 1);
  }, []);
  return { device, setIdentity, retry };
}
