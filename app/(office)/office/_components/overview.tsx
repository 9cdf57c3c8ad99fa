'use client';
import Link from 'next/link';
import { DataTable } from '@/components/ui/data-table';
import { Notice } from '@/components/ui/notice';
import { roleWords } from '@/lib/schema/words';
import type { Role } from '@/lib/schema/common';
import type { ProjectOverview } from '@/lib/server/projects/project-overview';
import type { QuarantinedOperation } from '@/lib/server/projects/list-quarantine';
import { fromCanonicalM } from '@/lib/trees/units';
import { formatValue } from '@/lib/trees/format-value';
import { useApi } from '../_hooks/use-api';
import { Loaded } from './loaded';
import { when } from './when';

function Fact({ name, children }: { readonly name: string; readonly children: React.ReactNode }) {
  return <div className="book-line flex gap-3 py-1"><dt className="w-44 shrink-0 text-ink-soft">{name}</dt><dd>{children}</dd></div>;
}

/** What an analyst wants to see first: what is locked, how far the plots are, what is in doubt. */
export function Overview({ projectId }: { readonly projectId: string }) {
  const overview = useApi<ProjectOverview>(`/api/v1/projects/${projectId}`);
  const quarantine = useApi<{ readonly operations: readonly QuarantinedOperation[] }>(`/api/v1/projects/${projectId}/quarantine`);
  return (
    <Loaded of={overview} what="The project">
      {({ project, strata, people, openLooks, stems, twoValues, lastArrivalAt }) => (
        <div className="grid gap-8 lg:grid-cols-2">
          <section aria-labelledby="locked">
            <h1 id="locked" className="pb-2 text-xl font-bold">{project.state === 'draft' ? 'Chosen, not yet locked' : 'Locked for the whole project'}</h1>
            <dl>
              <Fact name="DBH">{project.dbhUnit}, {project.dbhDecimals} decimal{project.dbhDecimals === 1 ? '' : 's'}, {project.rounding === 'down' ? 'rounded down' : 'rounded to nearest'}</Fact>
              <Fact name="Heights and lengths">{project.lengthUnit}, {project.heightDecimals} decimal{project.heightDecimals === 1 ? '' : 's'}</Fact>
              <Fact name="Areas">{project.areaUnit}</Fact>
              <Fact name="Breast height">{formatValue(fromCanonicalM(project.breastHeightM, project.lengthUnit), project.lengthUnit === 'ft' ? 1 : 2)} {project.lengthUnit}</Fact>
              <Fact name="Plot">circle, radius {formatValue(fromCanonicalM(project.plotDesign.radiusM, project.lengthUnit), 2)} {project.lengthUnit}</Fact>
              <Fact name="Coordinates">{project.crs}</Fact>
              <Fact name="Alarm rate">{project.alarmRatePer100} false second look{project.alarmRatePer100 === 1 ? '' : 's'} per 100 correct trees</Fact>
            </dl>
          </section>
          <section aria-labelledby="progress">
            <h2 id="progress" className="pb-2 text-xl font-bold">Plots of this round</h2>
            <DataTable
              caption="Plots by stratum" rows={strata} rowKey={({ id }) => id} empty="No strata yet."
              columns={[
                { key: 'name', head: 'Stratum', cell: ({ name }) => name },
                { key: 'plots', head: 'Plots', numeric: true, cell: ({ plots }) => plots },
                { key: 'begun', head: 'Open', numeric: true, cell: ({ begun }) => begun },
                { key: 'ended', head: 'Finished', numeric: true, cell: ({ ended }) => ended },
                { key: 'left', head: 'Not begun', numeric: true, cell: ({ plots, begun, ended }) => plots - begun - ended },
              ]}
            />
            <p className="pt-3"><span className="digits">{stems}</span> stem records; last arrival {lastArrivalAt ? when(lastArrivalAt) : 'none yet'}.</p>
            {openLooks > 0 && <p className="pt-1"><Link className="font-bold text-doubt underline underline-offset-4" href={`/office/p/${projectId}/trees?doubts=open`}>{openLooks} open second look{openLooks === 1 ? '' : 's'}</Link></p>}
            {twoValues > 0 && <p className="pt-1 font-bold text-doubt">{twoValues} value{twoValues === 1 ? '' : 's'} given twice, to be settled</p>}
          </section>
          <section aria-labelledby="kept-aside">
            <h2 id="kept-aside" className="pb-2 text-xl font-bold">Kept aside</h2>
            <Loaded of={quarantine} what="Entries kept aside">
              {({ operations }) => operations.length === 0 ? <p className="text-ink-soft">Everything that arrived could be applied.</p> : (
                <>
                  <Notice tone="plain" icon="hazard">These arrived and are kept word for word, but could not be applied.</Notice>
                  <DataTable
                    caption="Entries kept aside" rows={operations} rowKey={({ opId }) => opId} empty=""
                    columns={[
                      { key: 'when', head: 'Recorded', cell: ({ wallClock }) => when(wallClock) },
                      { key: 'who', head: 'By', cell: ({ author }) => author },
                      { key: 'what', head: 'What', cell: ({ entity, kind }) => `${kind} ${entity}` },
                      { key: 'why', head: 'Why not applied', cell: ({ reason }) => reason },
                    ]}
                  />
                </>
              )}
            </Loaded>
          </section>
          <section aria-labelledby="people">
            <h2 id="people" className="pb-2 text-xl font-bold">People</h2>
            <DataTable
              caption="People and roles" rows={people} rowKey={({ id }) => id} empty="Nobody yet."
              columns={[{ key: 'name', head: 'Name', cell: ({ name }) => name }, { key: 'role', head: 'Role', cell: ({ role }) => roleWords[role as Role] }]}
            />
          </section>
        </div>
      )}
    </Loaded>
  );
}
