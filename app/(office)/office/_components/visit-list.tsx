'use client';
import Link from 'next/link';
import { DataTable } from '@/components/ui/data-table';
import { DoubtTag } from '@/components/ui/doubt-tag';
import type { Visit, VisitOutcome } from '@/lib/schema/field';
import { outcomeWords, visitKindWords, visitStateWords } from '@/lib/schema/words';
import type { ListedVisit } from '@/lib/server/projects/list-visits';
import { useApi } from '../_hooks/use-api';
import { Loaded } from './loaded';
import { when } from './when';

/** All visits, newest first, with how each ended. */
export function VisitList({ projectId }: { readonly projectId: string }) {
  const visits = useApi<{ readonly visits: readonly ListedVisit[] }>(`/api/v1/projects/${projectId}/visits`);
  return (
    <>
      <h1 className="pb-3 text-xl font-bold">Visits</h1>
      <Loaded of={visits} what="Visits">
        {({ visits: rows }) => (
          <DataTable
            caption="Visits" rows={rows} rowKey={({ id }) => id} doubted={({ openLooks }) => openLooks > 0} empty="No visit has arrived yet. Crews bring theirs by camp sync."
            columns={[
              { key: 'plot', head: 'Plot', cell: ({ id, plot }) => <Link className="font-bold underline decoration-bronze underline-offset-4" href={`/office/p/${projectId}/visits/${id}`}>{plot}</Link> },
              { key: 'stratum', head: 'Stratum', oneLine: true, cell: ({ stratum }) => stratum },
              { key: 'kind', head: 'Kind', cell: ({ kind }) => visitKindWords[kind as Visit['kind']] },
              { key: 'started', head: 'Begun', oneLine: true, cell: ({ startedAt }) => when(startedAt) },
              { key: 'state', head: 'State', oneLine: true, cell: ({ state }) => visitStateWords[state as Visit['state']] },
              { key: 'outcome', head: 'Outcome', cell: ({ outcome, outcomeNote }) => <>{outcome === null ? '' : outcomeWords[outcome as VisitOutcome]}{outcomeNote && <span className="text-ink-soft">: {outcomeNote}</span>}</> },
              { key: 'people', head: 'Measured · recorded', cell: ({ measurer, recorder }) => [measurer, recorder].map((name) => name ?? '–').join(' · ') },
              { key: 'stems', head: 'Stems', numeric: true, cell: ({ stems }) => stems },
              { key: 'heights', head: 'Heights', numeric: true, cell: ({ heights }) => heights },
              { key: 'looks', head: 'Second looks', cell: ({ looks, openLooks }) => (looks === 0 ? '' : openLooks > 0 ? <DoubtTag>{openLooks} open of {looks}</DoubtTag> : `${looks}, all answered`) },
            ]}
          />
        )}
      </Loaded>
    </>
  );
}
