'use client';
import { useEffect, useState } from 'react';
import type { FieldStore } from '@/lib/client/field-store-types';

/** Operations on this device that no server has acknowledged, of all projects. */
export function useUnsent(store: FieldStore): number {
  const [unsent, setUnsent] = useState(0);
  useEffect(() => {
    let gone = false;
    void store.queue().then((queue) => {
      if (!gone) setUnsent(queue.unsent);
    });
    return () => {
      gone = true;
    };
  }, [store]);
  return unsent;
}
