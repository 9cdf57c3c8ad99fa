/** Runs once when the server starts, whoever started it: without a right environment it must not serve. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME !== 'nodejs') return;
  const { readEnvironment } = await import('@/lib/server/env');
  readEnvironment();
}
