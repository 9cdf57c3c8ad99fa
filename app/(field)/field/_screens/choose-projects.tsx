'use client';
import { useCallback, useEffect, useState } from 'react';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import type { PackSummary } from '@/lib/client/field-store-types';
import { dayWords } from '../_data/time-words';
import { useField } from '../_shell/field-context';
import { ServerError, fetchPack } from '../_shell/server-api';
import { SignOut } from '../_shell/sign-out';
import { ThemeToggle } from '../_shell/theme-toggle';
import { TopBar } from '../_shell/top-bar';

/** Projects of the person, and whether each one's work pack is on this phone. */
export function ProjectsScreen() {
  const { store, identity, go, view } = useField();
  const [packs, setPacks] = useState<readonly PackSummary[] | null>(null);
  const [fetching, setFetching] = useState<string | null>(null);
  const [fault, setFault] = useState<string | null>(null);

  const readPacks = useCallback(() => store.packs().then(setPacks), [store]);
  useEffect(() => {
    void readPacks();
  }, [readPacks]);

  async function fetchOne(projectId: string) {
    setFetching(projectId);
    setFault(null);
    try {
      await store.savePack(await fetchPack(projectId));
      await view(projectId).reload();
      await readPacks();
    } catch (error) {
      setFault(error instanceof ServerError ? error.message : `The work pack was not saved: ${error instanceof Error ? error.message : String(error)}`);
    } finally {
      setFetching(null);
    }
  }

  return (
    <>
      <TopBar back={null} over={`Signed in as ${identity.name}`} title="Projects"><ThemeToggle /></TopBar>
      <main className="mx-auto max-w-2xl space-y-4 p-4">
        {fault && <Notice tone="halt" icon="hazard" live="alert"><p>{fault}</p></Notice>}
        {identity.projects.length === 0 && <p className="text-lg">You are in no project yet. Its analyst can invite you.</p>}
        <ul className="space-y-4">
          {identity.projects.map(({ id, name, role }) => {
            const pack = packs?.find(({ projectId }) => projectId === id) ?? null;
            return (
              <li key={id} className="leaf-card rounded-lg bg-paper-raised p-4">
                <h2 className="text-xl font-bold">{name}</h2>
                <p className="text-ink-soft">{pack ? `On this phone, fetched ${dayWords(pack.fetchedAt)}` : 'Not on this phone yet'} · {role}</p>
                <div className="mt-3 flex flex-wrap gap-2">
                  {pack && <Button kind="main" className="flex-1" onClick={() => go({ name: 'project', projectId: id })}><span>Open<span className="sr-only"> {name}</span></span></Button>}
                  <Button
                    kind={pack ? 'plain' : 'main'} className="flex-1" disabled={fetching !== null || packs === null}
                    onClick={() => void fetchOne(id)}
                  >
                    {fetching === id ? 'Fetching…' : pack ? 'Fetch again' : 'Fetch work pack'}<span className="sr-only"> of {name}</span>
                  </Button>
                </div>
              </li>
            );
          })}
        </ul>
        <p className="text-ink-soft">A work pack holds all that the phone needs with no signal: plots, way in, species, the height curve, people. Fetching needs a network.</p>
        <SignOut />
      </main>
    </>
  );
}
