'use client';
import Link from 'next/link';
import { usePathname } from 'next/navigation';

const pages = [['', 'Overview'], ['/visits', 'Visits'], ['/trees', 'Trees and doubts'], ['/curves', 'Height curves'], ['/changes', 'Change log']] as const;

/** The pages of one project; its units stand beside its name on each of them. */
export function ProjectNav({ projectId, name, units }: { readonly projectId: string; readonly name: string; readonly units: string }) {
  const path = usePathname();
  const base = `/office/p/${projectId}`;
  return (
    <div className="flex flex-wrap items-baseline gap-x-6 gap-y-1 pt-4 pb-3">
      <p className="text-lg font-bold">{name} <span className="digits text-base font-normal text-ink-soft">{units}</span></p>
      <nav aria-label="Project" className="flex flex-wrap gap-x-1">
        {pages.map(([rest, words]) => {
          const here = rest === '' ? path === base : path.startsWith(`${base}${rest}`);
          return (
            <Link key={rest} href={`${base}${rest}`} aria-current={here ? 'page' : undefined} className={`px-2 py-2 ${here ? 'border-b-4 border-bronze font-bold' : 'underline decoration-paper-line underline-offset-4'}`}>{words}</Link>
          );
        })}
      </nav>
    </div>
  );
}
