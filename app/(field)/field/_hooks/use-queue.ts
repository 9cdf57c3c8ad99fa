'use client';
import { useEffect, useState } from 'react';
import type { QueueState } from '@/lib/client/field-store-types';
import { useField } from '../_shell/field-context';

/** What waits to be sent, kept up to date; null until it was read. */
export function useQueue(projectId?: string): QueueState | null {
  const { store } = useField();
  const [queue, setQueue] = useState<QueueState | null>(null);
  useEffect(() => {
    let gone = false;
    const read = () => {
      void store.queue(projectId).then((state) => {
        if (!gone) setQueue(state);
      });
    };
    read();
    const stop = store.subscribe(read);
    const timer = setInterval(read, 15_000);
    return () => {
      gone = true;
      stop();
      clearInterval(timer);
    };
  }, [store, projectId]);
  return queue;
}
