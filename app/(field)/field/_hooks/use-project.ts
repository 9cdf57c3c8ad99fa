'use client';
import { useSyncExternalStore } from 'react';
import type { ProjectSnapshot, ProjectView } from '../_data/project-view';
import { useField } from '../_shell/field-context';

/** A project's records as they stand, and the view that saves to them. */
export function useProject(projectId: string): { readonly view: ProjectView; readonly snapshot: ProjectSnapshot } {
  const view = useField().view(projectId);
  return { view, snapshot: useSyncExternalStore(view.subscribe, view.snapshot, view.snapshot) };
}
