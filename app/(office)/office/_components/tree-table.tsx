'use client';
import Link from 'next/link';
import { usePathname, useRouter, useSearchParams } from 'next/navigation';
import { DataTable } from '@/components/ui/data-table';
import type { StemMeasurement, Visit } from '@/lib/schema/field';
import { formWords, statusWords, visitKindWords } from '@/lib/schema/words';
import type { ProjectOverview } from '@/lib/server/projects/project-overview';
import { useApi } from '../_hooks/use-api';
import { DoubtCell } from './doubt-cell';
import { Loaded } from './loaded';
import { TreeFilters } from './tree-filters';
import { stemName } from './stem-name';
import { when } from './when';

type Row = Readonly<Record<string, string | number | null>>;
type Page = { readonly total: number; readonly limit: number; readonly offset: number; readonly rows: readonly Row[] };
const LIMIT = 100;
const linkLook = 'underline decoration-bronze underline-offset-4';

/** Stems by plot and visit with every doubt attached; the CSV and the JSON hold the same rows. */
export function TreeTable({ projectId }: { readonly projectId: string }) {
  const filter = new URLSearchParams(useSearchParams().toString());
  const path = usePathname();
  const router = useRouter();
  const offset = Number(filter.get('offset') ?? 0) || 0;
  const plain = new URLSearchParams([...filter].filter(([name, value]) => name !== 'offset' && value !== ''));
  const base = `/api/v1/projects/${projectId}`;
  const overview = useApi<ProjectOverview>(base);
  const trees = useApi<Page>(`${base}/trees?${new URLSearchParams([...plain, ['limit', String(LIMIT)], ['offset', String(offset)]])}`);
  const go = (next: URLSearchParams) => router.replace(`${path}?${next}`, { scroll: false });
  const change = (name: string, value: string) => {
    const next = new URLSearchParams(plain);
    if (value === '') next.delete(name);
    else next.set(name, value);
    go(next);
  };
  const turn = (to: number) => go(new URLSearchParams([...plain, ['offset', String(Math.max(0, to))]]));
  return (
    <>
      <h1 className="pb-3 text-xl font-bold">Trees and doubts</h1>
      <TreeFilters filter={filter} overview={overview.data} change={change} />
      <Loaded of={trees} what="Trees">
        {({ total, rows }) => (
          <>
            <p className="flex flex-wrap items-baseline gap-x-4 gap-y-1 pb-2">
              <span><b className="digits">{total}</b> stem record{total === 1 ? '' : 's'}{total > rows.length && `, ${offset + 1} to ${offset + rows.length} shown`}</span>
              <span className="ml-auto flex flex-wrap gap-x-4">
                <a className={linkLook} href={`${base}/trees.csv?${plain}`} download>Trees as CSV</a>
                <a className={linkLook} href={`${base}/second-looks.csv`} download>Second looks as CSV</a>
                <a className={linkLook} href={`${base}/dictionary.csv`} download>Data dictionary</a>
                <a className={linkLook} href={`${base}/trees?${plain}`}>JSON</a>
              </span>
            </p>
            <DataTable
              caption="Trees" rows={rows} rowKey={(row) => String(row.measurement_id)} doubted={(row) => Number(row.open_looks) > 0 || Number(row.two_values) > 0}
              empty="No tree fits these filters. Take one away, or wait for the next camp sync."
              columns={[
                { key: 'plot', head: 'Plot', cell: (row) => row.plot },
                { key: 'visit', head: 'Visit', oneLine: true, cell: (row) => <Link className={linkLook} href={`/office/p/${projectId}/visits/${row.visit_id}`}>{when(String(row.visit_started)).split(',')[0]}</Link> },
                { key: 'kind', head: 'Kind', cell: (row) => visitKindWords[row.visit_kind as Visit['kind']] },
                { key: 'tag', head: 'Tree', numeric: true, cell: (row) => stemName(String(row.tag), String(row.stem)) },
                { key: 'species', head: 'Species', oneLine: true, cell: (row) => row.species ?? '' },
                { key: 'form', head: 'Stem', oneLine: true, cell: (row) => `${statusWords[row.status as StemMeasurement['status']]}, ${formWords[row.form as StemMeasurement['form']].toLowerCase()}` },
                { key: 'dbh', head: 'DBH', numeric: true, cell: (row) => (row.dbh_digits === null ? '' : `${row.dbh_digits} ${row.dbh_unit}`) },
                { key: 'height', head: 'Height', numeric: true, cell: (row) => (row.height_digits === null ? '' : `${row.height_digits} ${row.height_unit}`) },
                { key: 'readings', head: 'Readings', numeric: true, cell: (row) => row.readings },
                { key: 'doubts', head: 'Second looks and their answers', cell: (row) => <DoubtCell row={row} /> },
              ]}
            />
            {total > LIMIT && (
              <nav aria-label="Pages of trees" className="flex gap-4 py-3">
                <button type="button" disabled={offset === 0} onClick={() => turn(offset - LIMIT)} className={`min-h-10 cursor-pointer px-2 disabled:cursor-default disabled:no-underline disabled:opacity-60 ${linkLook}`}>Earlier rows</button>
                <button type="button" disabled={offset + LIMIT >= total} onClick={() => turn(offset + LIMIT)} className={`min-h-10 cursor-pointer px-2 disabled:cursor-default disabled:no-underline disabled:opacity-60 ${linkLook}`}>Later rows</button>
              </nav>
            )}
          </>
        )}
      </Loaded>
    </>
  );
}
