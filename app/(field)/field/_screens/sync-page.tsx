'use client';
import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Icon } from '@/components/ui/icon';
import { Notice } from '@/components/ui/notice';
import { problemWords } from '../_data/sync-words';
import { dayWords } from '../_data/time-words';
import { useQueue } from '../_hooks/use-queue';
import { useField } from '../_shell/field-context';
import { SignInAgain } from '../_shell/sign-in-again';
import { TopBar } from '../_shell/top-bar';

const entityWords: Readonly<Record<string, string>> = {
  visit: 'A visit', tree: 'A tree', stem: 'A stem', stemMeasurement: 'A stem’s values', reading: 'A reading', secondLook: 'A second look', plot: 'A plot', project: 'The project',
};

/** Camp sync: what waits, what came through, what the server set aside and why. */
export function SyncScreen({ projectId, name }: { readonly projectId: string; readonly name: string }) {
  const { sync: { status, syncNow }, go, store } = useField();
  const queue = useQueue(projectId);
  const [asked, setAsked] = useState(false);
  const [running, setRunning] = useState(false);
  const busy = running || (status !== null && status.phase !== 'idle' && status.phase !== 'backing-off' && status.phase !== 'sign-in-needed');
  const problem = problemWords(status?.problem ?? null);

  async function run() {
    setRunning(true);
    await syncNow().finally(() => setRunning(false));
    setAsked(true);
  }

  return (
    <>
      <TopBar back={{ name: 'project', projectId }} backLabel="Plots" over={name} title="Camp sync" />
      <main className="mx-auto max-w-2xl space-y-5 p-4">
        <dl className="leaf-card grid grid-cols-[1fr_auto] items-baseline gap-y-2 rounded-lg bg-paper-raised p-4 text-lg">
          <dt>Waiting to be sent</dt><dd className="digits text-right text-2xl font-bold">{queue?.unsent ?? '…'}</dd>
          <dt>Last sync</dt><dd className="text-right">{queue?.lastSyncAt ? dayWords(queue.lastSyncAt) : 'never'}</dd>
          <dt>Set aside by the server</dt><dd className="digits text-right text-2xl font-bold">{queue?.quarantined.length ?? '…'}</dd>
        </dl>
        <Button kind="main" className="flex w-full items-center justify-center gap-2" disabled={status === null || busy} onClick={() => void run()}>
          <Icon name="sync" />{busy ? 'Syncing…' : 'Sync now'}
        </Button>
        <div aria-live="polite">
          {problem !== null && !busy && <Notice icon="phone" title="Not in step with the server"><p>{problem} Everything stays saved on this phone.</p></Notice>}
          {problem === null && asked && !busy && queue && (
            <Notice tone="fine" icon="check"><p>{queue.unsent === 0 ? 'Everything on this phone has reached the server.' : `${queue.unsent} changes still wait; the next sync goes on with them.`}</p></Notice>
          )}
        </div>
        {status?.problem === 'sign-in' && <SignInAgain />}
        {queue && queue.quarantined.length > 0 && (
          <section>
            <h2 className="text-xl font-bold">Set aside</h2>
            <p className="text-ink-soft">Kept word for word on the server, not applied. Show these to your lead.</p>
            <ul className="mt-2">
              {queue.quarantined.map(({ opId, reason, entity }) => (
                <li key={opId} className="book-line py-3"><b>{entityWords[entity] ?? entity}</b>: {reason}</li>
              ))}
            </ul>
          </section>
        )}
        <p className="text-ink-soft">This phone syncs by itself when there is a network. It keeps what was sent for at least 30 days.</p>
        <Button kind="quiet" className="w-full" onClick={() => go({ name: 'projects' })}>Projects and signing out</Button>
        <p className="digits text-center text-xs text-ink-soft">Device {store.deviceId}</p>
      </main>
    </>
  );
}
