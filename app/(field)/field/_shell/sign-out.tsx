'use client';
import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { useUnsent } from '../_hooks/use-unsent';
import { useField } from './field-context';

/** Signing out keeps everything on the phone; with unsent work it says so first. */
export function SignOut() {
  const { store, signOut, identity } = useField();
  const unsent = useUnsent(store);
  const [asking, setAsking] = useState(false);
  if (!asking) return <Button kind="quiet" className="w-full" onClick={() => (unsent > 0 ? setAsking(true) : void signOut())}>Sign out {identity.name}</Button>;
  return (
    <div className="space-y-3">
      <Notice icon="phone" live="alert" title={`${unsent} changes are not sent yet.`}>
        <p>They stay on this phone and are sent after somebody of their project signs in here. Signing in again needs a network.</p>
      </Notice>
      <div className="flex gap-2">
        <Button kind="main" className="flex-1" onClick={() => setAsking(false)}>Stay signed in</Button>
        <Button className="flex-1" onClick={() => void signOut()}>Sign out, keep the work</Button>
      </div>
    </div>
  );
}
