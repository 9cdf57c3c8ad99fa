'use client';
import { useCallback, useEffect, useState } from 'react';
import type { PackSummary } from '@/lib/client/field-store-types';
import { useField } from '../_shell/field-context';

export type Crew = { readonly measurerId: string | null; readonly recorderId: string | null };
type People = PackSummary['people'];

const readCrew = (value: unknown): Crew | null => {
  if (typeof value !== 'object' || value === null) return null;
  const { measurerId, recorderId } = value as Record<string, unknown>;
  return { measurerId: typeof measurerId === 'string' ? measurerId : null, recorderId: typeof recorderId === 'string' ? recorderId : null };
};

/** Who measures and who records, as last set on this device; the person signed in records until told otherwise. */
export function useCrew(projectId: string): { readonly crew: Crew; readonly setCrew: (crew: Crew) => void; readonly people: People } {
  const { store, identity } = useField();
  const [people, setPeople] = useState<People>([]);
  const [crew, set] = useState<Crew>({ measurerId: identity.userId, recorderId: identity.userId });
  useEffect(() => {
    let gone = false;
    void Promise.all([store.packs(), store.setting(`crew:${projectId}`)]).then(([packs, kept]) => {
      if (gone) return;
      setPeople(packs.find((pack) => pack.projectId === projectId)?.people ?? []);
      const known = readCrew(kept);
      if (known) set(known);
    });
    return () => {
      gone = true;
    };
  }, [store, projectId]);
  const setCrew = useCallback((chosen: Crew) => {
    set(chosen);
    void store.setSetting(`crew:${projectId}`, chosen);
  }, [store, projectId]);
  return { crew, setCrew, people };
}
