'use client';
import { useState } from 'react';
import { DataTable } from '@/components/ui/data-table';
import { Notice } from '@/components/ui/notice';
import type { CurvesOfProject } from '@/lib/server/curves/present-curves';
import type { ListedImport } from '@/lib/server/imports/list-imports';
import type { ProjectOverview } from '@/lib/server/projects/project-overview';
import { useApi } from '../_hooks/use-api';
import { CurveGroup } from './curve-group';
import { ImportForm } from './import-form';
import { Loaded } from './loaded';
import { when } from './when';

/** Reference trees, the fits they give, and what has been published to the crews. */
export function Curves({ projectId }: { readonly projectId: string }) {
  const base = `/api/v1/projects/${projectId}`;
  const overview = useApi<ProjectOverview>(base);
  const curves = useApi<CurvesOfProject>(`${base}/curves`);
  const imports = useApi<{ readonly imports: readonly ListedImport[] }>(`${base}/imports`);
  const [said, setSaid] = useState<string | null>(null);
  const changed = async (words: string) => {
    setSaid(words);
    await Promise.all([curves.mutate(), imports.mutate()]);
  };
  return (
    <>
      <h1 className="pb-3 text-xl font-bold">Height curves</h1>
      {said && <div className="pb-4"><Notice tone="fine" icon="check" live="status">{said}</Notice></div>}
      <Loaded of={curves} what="Height curves">
        {({ groups, published }) => (
          <>
            {groups.length === 0 && <Notice>There are no measured heights to fit yet. Bring reference trees below, or wait for finished visits.</Notice>}
            {overview.data && groups.map((group) => <CurveGroup key={group.curveGroup} base={base} group={group} project={overview.data!.project} changed={changed} />)}
            <section aria-labelledby="published" className="pt-8">
              <h2 id="published" className="pb-2 text-lg font-bold">Published to the crews</h2>
              <DataTable
                caption="Published curves" rows={published} rowKey={({ id }) => id} empty="Nothing is published; crews work from the weak start, which still catches a height in the wrong unit."
                columns={[
                  { key: 'group', head: 'Curve group', cell: ({ curveGroup }) => (curveGroup === '*' ? 'all groups' : curveGroup) },
                  { key: 'version', head: 'Version', numeric: true, cell: ({ version }) => version },
                  { key: 'form', head: 'Form', cell: ({ form }) => form },
                  { key: 'b0', head: 'b0', numeric: true, cell: ({ b0 }) => b0.toFixed(4) },
                  { key: 'b1', head: 'b1', numeric: true, cell: ({ b1 }) => b1.toFixed(4) },
                  { key: 's', head: 's', numeric: true, cell: ({ residualVariance }) => Math.sqrt(residualVariance).toFixed(4) },
                  { key: 'n', head: 'Trees', numeric: true, cell: ({ n }) => n },
                  { key: 'plots', head: 'Plots', numeric: true, cell: ({ plots }) => plots },
                  { key: 'source', head: 'From', cell: ({ source }) => source },
                  { key: 'when', head: 'Published', cell: ({ publishedAt }) => when(publishedAt) },
                ]}
              />
            </section>
          </>
        )}
      </Loaded>
      <section aria-labelledby="bring" className="grid gap-8 pt-8 lg:grid-cols-2">
        <div>
          <h2 id="bring" className="pb-2 text-lg font-bold">Bring reference trees</h2>
          {overview.data && <ImportForm base={base} project={overview.data.project} species={overview.data.species} changed={changed} />}
        </div>
        <div>
          <h2 className="pb-2 text-lg font-bold">Files taken so far</h2>
          <Loaded of={imports} what="Files">
            {({ imports: rows }) => (
              <DataTable
                caption="Files of reference trees" rows={rows} rowKey={({ id }) => id} empty="None yet."
                columns={[
                  { key: 'file', head: 'File', cell: ({ fileName, note }) => <>{fileName}{note && <span className="block text-ink-soft">{note}</span>}</> },
                  { key: 'rows', head: 'Trees', numeric: true, cell: ({ rows: count }) => count },
                  { key: 'units', head: 'Units', cell: ({ dbhUnit, lengthUnit }) => <span className="digits">{dbhUnit} · {lengthUnit}</span> },
                  { key: 'who', head: 'By', cell: ({ importedBy, importedAt }) => `${importedBy}, ${when(importedAt)}` },
                ]}
              />
            )}
          </Loaded>
        </div>
      </section>
    </>
  );
}
