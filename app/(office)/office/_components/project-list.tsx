'use client';
import Link from 'next/link';
import { DataTable } from '@/components/ui/data-table';
import { roleWords } from '@/lib/schema/words';
import type { ListedProject } from '@/lib/server/projects/list-projects';
import { useApi } from '../_hooks/use-api';
import { Loaded } from './loaded';

/** The projects of the person, with what each measures in. */
export function ProjectList() {
  const projects = useApi<{ readonly projects: readonly ListedProject[] }>('/api/v1/projects');
  return (
    <Loaded of={projects} what="Projects">
      {({ projects: rows }) => (
        <DataTable
          caption="Projects" rows={rows} rowKey={({ id }) => id} empty="You belong to no project yet. An administrator can add you to one."
          columns={[
            { key: 'name', head: 'Project', cell: ({ id, name, role }) => (role === 'crew' ? name : <Link href={`/office/p/${id}`} className="font-bold underline decoration-bronze underline-offset-4">{name}</Link>) },
            { key: 'role', head: 'You are', cell: ({ role }) => roleWords[role] },
            { key: 'state', head: 'State', cell: ({ state }) => state },
            { key: 'units', head: 'Units', oneLine: true, cell: ({ dbhUnit, lengthUnit, areaUnit }) => <span className="digits">{dbhUnit} · {lengthUnit} · {areaUnit}</span> },
          ]}
        />
      )}
    </Loaded>
  );
}
