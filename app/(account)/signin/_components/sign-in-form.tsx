'use client';
import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { Notice } from '@/components/ui/notice';

const schema = z.object({ email: z.string().trim().min(1, 'Type your e-mail address.'), password: z.string().min(1, 'Type your password.') });
const look = 'min-h-12 w-full rounded-lg border-2 border-ink-faint bg-paper-raised px-3 text-lg text-ink';

async function signIn(fields: z.infer<typeof schema>): Promise<'in' | 'refused'> {
  const { csrfToken } = (await (await fetch('/api/auth/csrf')).json()) as { csrfToken: string };
  const response = await fetch('/api/auth/callback/credentials', { method: 'POST', body: new URLSearchParams({ ...fields, csrfToken, json: 'true' }), redirect: 'manual' });
  return response.ok ? 'in' : 'refused';
}

/** E-mail address and password; one answer for everything that is not right. */
export function SignInForm({ next }: { readonly next: string }) {
  const [wrong, setWrong] = useState<string | null>(null);
  const { register, handleSubmit, formState: { errors, isSubmitting } } = useForm({ resolver: zodResolver(schema), defaultValues: { email: '', password: '' } });
  const send = handleSubmit(async (fields) => {
    setWrong(null);
    try {
      if ((await signIn(fields)) === 'in') window.location.assign(next);
      else setWrong('That address and password do not go together, or there were too many tries. Look at both; after several tries wait a quarter of an hour.');
    } catch {
      setWrong('The server cannot be reached. Check the network and try again.');
    }
  });
  const field = (name: 'email' | 'password', label: string, autoComplete: string) => (
    <div>
      <label htmlFor={name} className="mb-1 block font-bold">{label}</label>
      <input id={name} type={name} autoComplete={autoComplete} aria-invalid={errors[name] !== undefined} aria-describedby={errors[name] ? `${name}-wrong` : undefined} className={look} {...register(name)} />
      {errors[name] && <p id={`${name}-wrong`} className="pt-1 text-halt">{errors[name].message}</p>}
    </div>
  );
  return (
    <form noValidate method="post" onSubmit={(event) => void send(event)} className="space-y-4 pt-6">
      {field('email', 'E-mail address', 'username')}
      {field('password', 'Password', 'current-password')}
      {wrong && <Notice tone="halt" icon="hazard" live="alert">{wrong}</Notice>}
      <button type="submit" disabled={isSubmitting} className="min-h-target w-full cursor-pointer rounded-lg border-2 border-bronze-strong bg-bronze px-4 text-lg font-bold text-bronze-on disabled:opacity-60">{isSubmitting ? 'Signing in …' : 'Sign in'}</button>
    </form>
  );
}
