'use client';
import { useState } from 'react';
import type { FormEvent } from 'react';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { TextInput } from '@/components/ui/text-input';
import { useField } from './field-context';
import { ServerError, signIn } from './server-api';

/** A session that has ended is begun again where one stands; nothing on the device changes but who may send. */
export function SignInAgain() {
  const { identity, setIdentity, sync } = useField();
  const [password, setPassword] = useState('');
  const [busy, setBusy] = useState(false);
  const [fault, setFault] = useState<string | null>(null);

  async function submit(event: FormEvent) {
    event.preventDefault();
    setBusy(true);
    setFault(null);
    try {
      await setIdentity(await signIn(identity.email, password));
      await sync.signedIn();
    } catch (error) {
      setFault(error instanceof ServerError ? error.message : 'Signing in did not work. Try again.');
    } finally {
      setBusy(false);
    }
  }

  return (
    <form className="leaf-card space-y-3 rounded-lg bg-paper-raised p-4" onSubmit={(event) => void submit(event)}>
      <p>Sign in again as <b>{identity.email}</b></p>
      <TextInput label="Password" name="password" type="password" autoComplete="current-password" required value={password} onChange={(event) => setPassword(event.target.value)} />
      {fault && <Notice tone="halt" icon="hazard" live="alert"><p>{fault}</p></Notice>}
      <Button kind="main" type="submit" className="w-full" disabled={busy}>{busy ? 'Signing in…' : 'Sign in'}</Button>
    </form>
  );
}
