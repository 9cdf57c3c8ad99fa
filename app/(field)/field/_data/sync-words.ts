import type { SyncStatus } from '@/lib/client/start-sync';

/** Why nothing goes to the server just now, in words; null when nothing is wrong. */
export function problemWords(problem: SyncStatus['problem']): string | null {
  switch (problem) {
    case null:
      return null;
    case 'offline':
      return 'No answer from the server: no network here, or it is not running.';
    case 'not-ours':
      return 'Something else than the Lammas server answered. This network may ask for a log-in of its own.';
    case 'too-big':
      return 'The server takes less at a time; it is tried again in smaller pieces.';
    case 'server':
      return 'The server has a fault of its own; it is tried again by itself.';
    case 'busy':
      return 'The server asks this phone to wait a little; it is tried again by itself.';
    case 'sign-in':
      return 'The server wants you to sign in again. Recording goes on without it.';
    case 'denied':
      return 'The server no longer lets you into this project. Ask its analyst.';
    case 'refused':
      return 'The server did not understand this app. A newer version may be needed.';
    case 'diverged':
      return 'Phone and server differ; the work pack is fetched anew.';
  }
}
