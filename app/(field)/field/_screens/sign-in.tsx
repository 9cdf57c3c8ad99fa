'use client';
import { useState } from 'react';
import type { FormEvent } from 'react';
import { Button } from '@/components/ui/button';
import { Icon } from '@/components/ui/icon';
import { Notice } from '@/components/ui/notice';
import { TextInput } from '@/components/ui/text-input';
import type { FieldStore, Identity } from '@/lib/client/field-store-types';
import { useUnsent } from '../_hooks/use-unsent';
import { ServerError, signIn } from '../_shell/server-api';

type Props = { readonly store: FieldStore; readonly done: (person: Identity) => Promise<void> };

/** The first page of the book: who writes in it. Needs the network, once. */
export function SignInScreen({ store, done }: Props) {
  const [email, setEmail] = useState('');
  const [password, setPassword] = useState('');
  const [busy, setBusy] = useState(false);
  const [fault, setFault] = useState<string | null>(null);
  const unsent = useUnsent(store);

  async function submit(event: FormEvent) {
    event.preventDefault();
    setBusy(true);
    setFault(null);
    try {
      await done(await signIn(email.trim(), password));
    } catch (error) {
      setFault(error instanceof ServerError ? error.message : 'Signing in did not work. Try again.');
      setBusy(false);
    }
  }

  return (
    <main className="mx-auto flex min-h-dvh max-w-md flex-col gap-5 p-5 pt-12">
      <header className="book-cover">
        <Icon name="leaf" className="size-12 text-bronze" />
        <h1 className="mt-2 text-4xl font-bold tracking-tight">Lammas</h1>
        <p className="text-lg text-ink-soft">Field book. Every tree gets a second look.</p>
      </header>
      {unsent > 0 && (
        <Notice icon="phone" title={`${unsent} changes wait on this phone.`}>
          <p>They are kept. They are sent after somebody of their project signs in here.</p>
        </Notice>
      )}
      <form className="space-y-4" onSubmit={(event) => void submit(event)}>
        <TextInput label="E-mail" name="email" type="email" autoComplete="username" required value={email} onChange={(event) => setEmail(event.target.value)} />
        <TextInput label="Password" name="password" type="password" autoComplete="current-password" required value={password} onChange={(event) => setPassword(event.target.value)} />
        {fault && <Notice tone="halt" icon="hazard" live="alert"><p>{fault}</p></Notice>}
        <Button kind="main" type="submit" className="w-full" disabled={busy}>{busy ? 'Signing in…' : 'Sign in'}</Button>
      </form>
      <p className="text-ink-soft">Signing in needs a network, once. After that the field book opens on this phone without one, for days.</p>
    </main>
  );
}
