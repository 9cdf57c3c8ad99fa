'use client';
import { useEffect, useMemo } from 'react';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import type { FieldStore, Identity } from '@/lib/client/field-store-types';
import { ProjectView } from '../_data/project-view';
import { useDevice } from '../_hooks/use-device';
import { useRoute } from '../_hooks/use-route';
import { useSync } from '../_hooks/use-sync';
import { useTheme } from '../_hooks/use-theme';
import { useUpdate } from '../_hooks/use-update';
import { SignInScreen } from '../_screens/sign-in';
import { FieldContext } from './field-context';
import type { FieldContextValue } from './field-context';
import { LAST_PLACE, usePlace } from '../_hooks/use-place';
import { parsePath } from './router';
import type { FieldRoute } from './router';
import { Screens } from './screens';
import { endSession } from './server-api';
import { UpdateLine } from './update-line';

/** The root of the field: opens the device's store, then shows the screen that the address names. */
export function FieldShell() {
  const { device, setIdentity, retry } = useDevice();
  const { route, go } = useRoute();
  const update = useUpdate();
  const store = device.kind === 'open' ? device.store : null;
  const identity = device.kind === 'open' ? device.identity : null;
  const { theme, setTheme } = useTheme(store);
  const sync = useSync(store, identity?.userId ?? null);
  usePlace(store, identity !== null, route);

  const value = useMemo<FieldContextValue | null>(() => (store && identity ? {
    store, identity, go, theme, setTheme, sync, setIdentity,
    view: (projectId) => viewOf(store, projectId),
    signOut: async () => {
      await setIdentity(null);
      // The person has left this device whether or not the server hears of it now.
      await endSession().catch(() => undefined);
    },
  } : null), [store, identity, go, theme, setTheme, sync, setIdentity]);

  if (device.kind === 'failed') return <StoreFailed reason={device.reason} retry={retry} />;
  if (!store) return <p className="p-6 text-xl" role="status">Opening the field book…</p>;
  if (!value) return <SignInScreen store={store} done={(person) => begin(person, setIdentity, go)} />;
  return (
    <FieldContext value={value}>
      {route.name === 'start' ? <Start store={store} identity={value.identity} go={go} /> : <Screens route={route} />}
      {update.waiting && route.name !== 'visit' && <UpdateLine use={update.use} />}
    </FieldContext>
  );
}

const views = new WeakMap<FieldStore, Map<string, ProjectView>>();

/** One view of each project for as long as the store is open. */
function viewOf(store: FieldStore, projectId: string): ProjectView {
  const known = views.get(store) ?? new Map<string, ProjectView>();
  views.set(store, known);
  const view = known.get(projectId) ?? new ProjectView(store, projectId);
  known.set(projectId, view);
  return view;
}

async function begin(person: Identity, setIdentity: (identity: Identity) => Promise<void>, go: (route: FieldRoute) => void): Promise<void> {
  await setIdentity(person);
  if (parsePath(window.location.pathname).name === 'start') go({ name: 'projects' });
}

/** The bare address leads to where this device was last, else to the projects. */
function Start({ store, identity, go }: { readonly store: FieldStore; readonly identity: Identity; readonly go: FieldContextValue['go'] }) {
  useEffect(() => {
    const open = async () => {
      const place = await store.setting(LAST_PLACE);
      const known = typeof place === 'string' ? parsePath(place) : null;
      if (known && known.name !== 'start' && known.name !== 'unknown') return go(known, { replace: true });
      const [only, ...more] = await store.packs();
      go(only && more.length === 0 ? { name: 'project', projectId: only.projectId } : { name: 'projects' }, { replace: true });
    };
    void open();
  }, [store, identity, go]);
  return <p className="p-6 text-xl" role="status">Opening the field book…</p>;
}

function StoreFailed({ reason, retry }: { readonly reason: string; readonly retry: () => void }) {
  return (
    <main className="mx-auto max-w-xl space-y-4 p-4">
      <h1 className="text-2xl font-bold">The field book does not open</h1>
      <Notice tone="halt" icon="hazard" live="alert" title="This phone’s storage did not answer.">
        <p>Nothing is lost by that. Close other tabs of Lammas and try again; if it stays so, restart the browser.</p>
        <p className="mt-2 text-sm">{reason}</p>
      </Notice>
      <Button kind="main" className="w-full" onClick={retry}>Try again</Button>
    </main>
  );
}
