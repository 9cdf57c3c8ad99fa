'use client';
import Link from 'next/link';
import { useSearchParams } from 'next/navigation';
import { DataTable } from '@/components/ui/data-table';
import type { Json } from '@/lib/schema/common';
import type { ChangePage, ListedChange } from '@/lib/server/projects/list-changes';
import { useApi } from '../_hooks/use-api';
import { Loaded } from './loaded';
import { when } from './when';

const linkLook = 'underline decoration-bronze underline-offset-4';
const entityWords: Readonly<Record<string, string>> = {
  project: 'Project', stratum: 'Stratum', speciesEntry: 'Species', plot: 'Plot', heightCurve: 'Height curve', visit: 'Visit', tree: 'Tree', stem: 'Stem',
  stemMeasurement: 'Stem’s values', reading: 'Reading', secondLook: 'Second look', conflict: 'Two values',
};
const kindWords: Readonly<Record<string, string>> = { create: 'made', set: 'changed', delete: 'deleted', restore: 'restored', resolve: 'settled' };
const stateWords: Readonly<Record<string, string>> = { applied: '', same: 'changed nothing', conflict: 'kept beside another value', quarantined: 'kept aside' };

const shown = (value: Json): string => (value === null || value === '' ? '–' : typeof value === 'object' ? JSON.stringify(value) : String(value));

function Fields({ change }: { readonly change: ListedChange }) {
  const fields = change.kind === 'create' ? change.fields.filter(({ new: value }) => value !== null && value !== '') : change.fields.filter((field) => JSON.stringify(field.old) !== JSON.stringify(field.new));
  if (fields.length === 0) return null;
  return (
    <details>
      <summary className="cursor-pointer">{change.kind === 'create' ? `${fields.length} values` : fields.map(({ name }) => name).join(', ')}</summary>
      <dl className="pl-4">
        {fields.map(({ name, old, new: value }) => (
          <div key={name}><dt className="inline text-ink-soft">{name}: </dt><dd className="digits inline break-all">{change.kind === 'create' ? shown(value) : `${shown(old)} → ${shown(value)}`}</dd></div>
        ))}
      </dl>
    </details>
  );
}

/** Who changed what, from what to what, when, on which device, and why: of the project, or of one record named in the address. */
export function ChangeLog({ projectId }: { readonly projectId: string }) {
  const asked = useSearchParams();
  const query = new URLSearchParams([...asked].filter(([name]) => name === 'record' || name === 'before'));
  const page = useApi<ChangePage>(`/api/v1/projects/${projectId}/changes?${query}`);
  const here = `/office/p/${projectId}/changes`;
  const record = query.get('record');
  return (
    <>
      <h1 className="pb-3 text-xl font-bold">Change log{record && ' of one record'}</h1>
      {record && <p className="pb-3"><Link className={linkLook} href={here}>All changes of the project</Link></p>}
      <Loaded of={page} what="The change log">
        {({ changes, before }) => (
          <>
            <DataTable
              caption="Changes" rows={changes} rowKey={({ cursor }) => String(cursor)} doubted={({ state }) => state === 'conflict' || state === 'quarantined'} empty="Nothing has been changed here."
              columns={[
                { key: 'cursor', head: 'No.', numeric: true, cell: ({ cursor }) => cursor },
                { key: 'when', head: 'When, clock of the device', oneLine: true, cell: ({ wallClock }) => when(wallClock) },
                { key: 'who', head: 'Who', oneLine: true, cell: ({ author }) => author },
                { key: 'where', head: 'Where', cell: ({ byServer, deviceId }) => (byServer ? 'office' : <span title={deviceId}>device <span className="digits">…{deviceId.slice(-6)}</span></span>) },
                { key: 'what', head: 'What', cell: ({ entity, kind, recordId }) => <Link className={linkLook} href={`${here}?record=${recordId}`}>{entityWords[entity] ?? entity} {kindWords[kind] ?? kind}</Link> },
                { key: 'fields', head: 'Old and new', cell: (change) => <Fields change={change} /> },
                { key: 'why', head: 'Why', cell: ({ reason, state, stateReason }) => [reason, stateWords[state], stateReason].filter(Boolean).join('; ') },
              ]}
            />
            {before !== null && <p className="py-3"><Link className={linkLook} href={`${here}?${new URLSearchParams([...(record ? [['record', record]] : []), ['before', String(before)]])}`}>Earlier changes</Link></p>}
          </>
        )}
      </Loaded>
    </>
  );
}
