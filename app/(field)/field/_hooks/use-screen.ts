'use client';
import { useCallback, useEffect, useMemo, useState } from 'react';
import type { Screen } from '@/lib/checks/types';
import type { RecordChange } from '@/lib/schema/record-change';
import { projectScreen, teachChanged } from '../_data/project-screen';
import { roundStart } from '../_data/round-start';
import type { ProjectRecords } from '../_data/project-records';
import type { ProjectView } from '../_data/project-view';

/** Measurements that changes are about. */
function touched(changes: readonly RecordChange[], records: ProjectRecords): ReadonlySet<string> {
  return new Set(changes.flatMap(({ entity, recordId }) => {
    if (entity === 'stemMeasurement') return [recordId];
    if (entity === 'secondLook') return records.secondLook.get(recordId)?.measurementId ?? [];
    return [];
  }));
}

/**
 * The checks of a project, made once when it is opened and again when a sync brought records; what is saved here
 * teaches as it is saved (`learn`).
 */
export function useScreen(view: ProjectView, blindPlotId: string | null): { readonly screen: Screen | null; readonly learn: (changes: readonly RecordChange[]) => void } {
  const [loads, setLoads] = useState(0);
  useEffect(() => view.onLoaded(() => setLoads((before) => before + 1)), [view]);
  const screen = useMemo(() => {
    const snapshot = view.snapshot();
    // A load counts, not each record saved since: those are taught one by one.
    return loads >= 0 && snapshot.kind === 'ready' ? projectScreen(snapshot.records, view.projectId, roundStart(), blindPlotId) : null;
  }, [view, blindPlotId, loads]);
  const learn = useCallback((changes: readonly RecordChange[]) => {
    const snapshot = view.snapshot();
    if (screen && snapshot.kind === 'ready' && blindPlotId === null) teachChanged(screen, snapshot.records, touched(changes, snapshot.records), roundStart());
  }, [screen, view, blindPlotId]);
  return { screen, learn };
}
