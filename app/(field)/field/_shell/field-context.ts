'use client';
import { createContext, useContext } from 'react';
import type { FieldStore, Identity } from '@/lib/client/field-store-types';
import type { ProjectView } from '../_data/project-view';
import type { FieldSync } from '../_hooks/use-sync';
import type { FieldRoute } from './router';

export type Theme = 'paper' | 'dusk';

export type FieldContextValue = {
  readonly store: FieldStore;
  readonly identity: Identity;
  readonly view: (projectId: string) => ProjectView;
  readonly go: (route: FieldRoute, options?: { readonly replace?: boolean }) => void;
  readonly theme: Theme;
  readonly setTheme: (theme: Theme) => void;
  readonly signOut: () => Promise<void>;
  /** After a sign-in or a changed list of projects. */
  readonly setIdentity: (identity: Identity) => Promise<void>;
  readonly sync: FieldSync;
};

export const FieldContext = createContext<FieldContextValue | null>(null);

/** What every screen of a signed-in field shares. */
export function useField(): FieldContextValue {
  const value = useContext(FieldContext);
  if (!value) throw new Error('useField is for screens inside the field shell');
  return value;
}
