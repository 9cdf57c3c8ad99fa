'use client';

/** Ends the session and goes to the sign-in page. */
export function SignOutButton() {
  const leave = async () => {
    const { csrfToken } = (await (await fetch('/api/auth/csrf')).json()) as { csrfToken: string };
    await fetch('/api/auth/signout', { method: 'POST', body: new URLSearchParams({ csrfToken, json: 'true' }), redirect: 'manual' });
    // A whole new page: nothing of the session may stay in memory.
    window.location.replace(new URL('/signin', window.location.origin));
  };
  return <button type="button" onClick={() => void leave()} className="min-h-10 cursor-pointer px-2 underline decoration-bronze underline-offset-4">Sign out</button>;
}
