/*
 * Keeps the editor usable when nothing serves it any more. The build puts the version and the files in.
 * A new version waits until every window of the old one is closed, so that no window loses its files.
 */
const CACHE = 'spooltable-VERSION';
const FILES = [];
/** How long a network that is there but does not answer may hold up a start. */
const PATIENCE_MS = 3000;

self.addEventListener('install', (event) => {
  const fresh = FILES.map((file) => new Request(file, { cache: 'reload' }));
  event.waitUntil(caches.open(CACHE).then((cache) => cache.addAll(fresh)));
});

self.addEventListener('activate', (event) => {
  event.waitUntil(
    caches
      .keys()
      .then((names) => names.filter((name) => name.startsWith('spooltable-') && name !== CACHE))
      .then((old) => Promise.all(old.map((name) => caches.delete(name))))
      .then(() => self.clients.claim()),
  );
});

self.addEventListener('fetch', (event) => {
  const { request } = event;
  if (request.method !== 'GET' || !request.url.startsWith(self.registration.scope)) return;
  event.respondWith(request.mode === 'navigate' ? page(request) : file(request));
});

/** A page asks for its scripts with an origin, which servers may say to vary by; the file is the same. */
const kept = async (request) => (await caches.open(CACHE)).match(request, { ignoreSearch: true, ignoreVary: true });

/** Names of files change with what is in them, so a kept one is never out of date. */
const file = async (request) => (await kept(request)) ?? fetch(request);

/** The newest page if it can be had, else the kept one. */
async function page(request) {
  const network = fetch(request);
  try {
    const late = new Promise((resolve) => setTimeout(resolve, PATIENCE_MS));
    return (await Promise.race([network, late])) ?? (await kept(request)) ?? (await network);
  } catch (error) {
    const page = await kept(request);
    if (page) return page;
    throw error;
  }
}
