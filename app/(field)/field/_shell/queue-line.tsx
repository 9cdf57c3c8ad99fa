'use client';
import { Icon } from '@/components/ui/icon';
import { timeWords } from '../_data/time-words';
import { useQueue } from '../_hooks/use-queue';
import { useField } from './field-context';

/** One quiet line about what is saved and sent; it leads to the sync page. */
export function QueueLine({ projectId }: { readonly projectId: string }) {
  const { go } = useField();
  const queue = useQueue(projectId);
  if (!queue) return <div className="min-h-target" />;
  const { unsent, lastSyncAt, quarantined } = queue;
  const words = [
    'Saved on this phone', unsent === 0 ? 'nothing unsent' : `${unsent} unsent`, lastSyncAt ? `last sync ${timeWords(lastSyncAt)}` : 'never synced',
  ].join(' · ');
  return (
    <button
      type="button" onClick={() => go({ name: 'sync', projectId })}
      className="flex min-h-target w-full cursor-pointer items-center gap-2 border-b border-paper-line bg-paper-sunk px-4 text-left text-sm active:bg-bronze-wash"
    >
      <Icon name="sync" className="size-5" />
      <span className="flex-1">{words}{quarantined.length > 0 && <b className="text-halt"> · {quarantined.length} set aside</b>}</span>
      <span className="font-bold underline decoration-bronze decoration-2 underline-offset-4">Sync</span>
    </button>
  );
}
