import { NavigationRoute, NetworkOnly, Route, Serwist } from 'serwist';
import type { PrecacheEntry } from 'serwist';

/** Put in by lib/cli/after-build.ts: what the field needs, each file with its revision. */
declare const LAMMAS_PRECACHE: PrecacheEntry[];

const serwist = new Serwist({
  precacheEntries: LAMMAS_PRECACHE,
  precacheOptions: { cleanupOutdatedCaches: false, cleanURLs: false, directoryIndex: null },
  // An update waits until the person takes it; a preload or a prefetch would race with the shell at an offline start.
  skipWaiting: false,
  clientsClaim: true,
  navigationPreload: false,
});

// The first rule: an answer of the API is never kept, never read from a cache.
const api = new Route(({ url, sameOrigin }) => sameOrigin && url.pathname.startsWith('/api/'), new NetworkOnly());
serwist.routes.get('GET')?.unshift(api);

// Every address of the field is the same page, from the precache, whether there is a network or not.
serwist.registerRoute(new NavigationRoute(serwist.createHandlerBoundToUrl('/field'), { allowlist: [/^\/field(\/|$)/] }));

serwist.addEventListeners();
