'use client';
import { useEffect, useState } from 'react';
import { Button } from '@/components/ui/button';
import { useProject } from '../_hooks/use-project';
import { FinishScreen } from '../_screens/finish-visit';
import { PlotScreen } from '../_screens/plot-page';
import { ProjectScreen } from '../_screens/project-home';
import { ProjectsScreen } from '../_screens/choose-projects';
import { SyncScreen } from '../_screens/sync-page';
import { VisitScreen } from '../_screens/visit-page';
import { useField } from './field-context';
import type { FieldRoute } from './router';
import { TopBar } from './top-bar';

/** The screen of a route. */
export function Screens({ route }: { readonly route: FieldRoute }) {
  switch (route.name) {
    case 'project':
    case 'sync':
    case 'plot':
    case 'visit':
    case 'finish':
      return <ProjectGate route={route} />;
    case 'projects':
    case 'start':
      return <ProjectsScreen />;
    case 'unknown':
      return <Lost words="There is no such page in the field book." />;
  }
}

type ProjectRoute = Extract<FieldRoute, { projectId: string }>;

/** Screens of a project need its records; without its work pack on the device they say so. */
function ProjectGate({ route }: { readonly route: ProjectRoute }) {
  const { snapshot, view } = useProject(route.projectId);
  if (snapshot.kind === 'loading') return <Opening />;
  if (snapshot.kind === 'missing') return <Lost words="The work pack of this project is not on this phone." />;
  const { records } = snapshot;
  if (route.name === 'project') return <ProjectScreen records={records} projectId={route.projectId} />;
  if (route.name === 'sync') return <SyncScreen projectId={route.projectId} name={records.project.get(route.projectId)?.name ?? ''} />;
  const plot = records.plot.get(route.plotId);
  if (!plot) return <Lost words="This plot is not in the work pack." />;
  if (route.name === 'plot') return <PlotScreen records={records} view={view} plot={plot} />;
  const visit = records.visit.get(route.visitId);
  if (!visit) return <Lost words="This visit is not on this phone." />;
  return route.name === 'visit'
    ? <VisitScreen key={visit.id} records={records} view={view} plot={plot} visit={visit} />
    : <FinishScreen records={records} view={view} plot={plot} visit={visit} />;
}

/** Says nothing for the first moment, so that quick starts do not flicker. */
function Opening() {
  const [late, setLate] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setLate(true), 300);
    return () => clearTimeout(timer);
  }, []);
  return <p className="p-6 text-xl" role="status">{late ? 'Opening the plots…' : ''}</p>;
}

function Lost({ words }: { readonly words: string }) {
  const { go } = useField();
  return (
    <>
      <TopBar back={null} title="Not here" />
      <main className="mx-auto max-w-xl space-y-4 p-4">
        <p className="text-lg">{words}</p>
        <Button kind="main" className="w-full" onClick={() => go({ name: 'projects' })}>To the projects</Button>
      </main>
    </>
  );
}
