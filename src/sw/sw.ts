import { cleanupOutdatedCaches, createHandlerBoundToURL, precacheAndRoute } from 'workbox-precaching';
import { NavigationRoute, registerRoute } from 'workbox-routing';

declare const self: ServiceWorkerGlobalScope & { __WB_MANIFEST: (string | { url: string; revision: string | null })[] };

/*
 * Everything a walk needs is put aside when a version is installed, so that the stand opens without a network. A new
 * version waits: it starts when a person asks for it, or when the browser was closed and is opened again (fault 14).
 */
precacheAndRoute(self.__WB_MANIFEST);
cleanupOutdatedCaches();

// Every address of the program is the one page; the server's own addresses and the public page are not ours to answer.
registerRoute(
  new NavigationRoute(createHandlerBoundToURL('/index.html'), { denylist: [/^\/api\//, /^\/p\//, /^\/verify/] }),
);

self.addEventListener('message', (event) => {
  if ((event.data as { type?: unknown } | null)?.type === 'start') void self.skipWaiting();
});
