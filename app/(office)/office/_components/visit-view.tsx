'use client';
import type { Visit, VisitOutcome } from '@/lib/schema/field';
import { outcomeWords, visitKindWords, visitStateWords } from '@/lib/schema/words';
import type { ProjectOverview } from '@/lib/server/projects/project-overview';
import type { VisitDetail } from '@/lib/server/projects/read-visit';
import { useApi } from '../_hooks/use-api';
import { Loaded } from './loaded';
import { VisitStemRow } from './visit-stem-row';
import { when } from './when';

/** One visit: every stem with all its readings and each second look with its answer. */
export function VisitView({ projectId, visitId }: { readonly projectId: string; readonly visitId: string }) {
  const overview = useApi<ProjectOverview>(`/api/v1/projects/${projectId}`);
  const detail = useApi<VisitDetail>(`/api/v1/projects/${projectId}/visits/${visitId}`);
  return (
    <Loaded of={detail} what="The visit">
      {({ visit, stems }) => (
        <>
          <h1 className="pb-1 text-xl font-bold">Plot {visit.plot}, {visitKindWords[visit.kind as Visit['kind']].toLowerCase()} visit</h1>
          <p className="pb-4 text-ink-soft">
            {visit.stratum}. Begun {when(visit.startedAt)}{visit.finishedAt && `, finished ${when(visit.finishedAt)}`}. {visitStateWords[visit.state as Visit['state']]}
            {visit.outcome && `: ${outcomeWords[visit.outcome as VisitOutcome].toLowerCase()}`}{visit.outcomeNote && ` (${visit.outcomeNote})`}.
            {' '}Measured by {visit.measurer ?? 'nobody named'}, recorded by {visit.recorder ?? 'nobody named'}.
          </p>
          {stems.length === 0 ? <p className="book-line py-6 text-ink-soft">No trees were recorded at this visit.</p> : (
            <ol aria-label="Stems" className="border-t border-paper-line">
              {stems.map((stem) => <VisitStemRow key={stem.measurement.id} stem={stem} project={overview.data?.project} />)}
            </ol>
          )}
        </>
      )}
    </Loaded>
  );
}
