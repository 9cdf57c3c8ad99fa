import { headers } from 'next/headers';
import { notFound, redirect } from 'next/navigation';
import type { ReactNode } from 'react';
import { getUser } from '@/lib/server/auth';
import { can } from '@/lib/server/policies';
import { openDatabase } from '@/models';
import { ProjectNav } from '../../_components/project-nav';

export default async function ProjectLayout({ children, params }: { readonly children: ReactNode; readonly params: Promise<{ projectId: string }> }) {
  const [{ projectId }, user] = await Promise.all([params, headers().then((all) => getUser({ headers: all }))]);
  if (!user) redirect(`/signin?callbackUrl=/office/p/${encodeURIComponent(projectId)}`);
  const { models } = await openDatabase();
  const project = can(user, 'data.read', projectId) ? await models.Project.findOne({ where: { id: projectId, deleted: false } }) : null;
  if (!project) notFound();
  return (
    <>
      <ProjectNav projectId={projectId} name={project.name} units={`${project.dbhUnit} · ${project.lengthUnit} · ${project.areaUnit}`} />
      {children}
    </>
  );
}
