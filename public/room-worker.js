// Keeps the shell of the exam room, so that a reload without network works. It never sees an answer or a paper:
// those go through the room's own store, and requests to /api pass by untouched.
const shells = 'room-shell-1';
const files = 'room-files-1';
const patience = 4000;

self.addEventListener('install', () => self.skipWaiting());
self.addEventListener('activate', (event) => event.waitUntil(self.clients.claim()));

const within = (promise, ms) => Promise.race([promise, new Promise((_, reject) => setTimeout(() => reject(new Error('late')), ms))]);

async function shell(request) {
  const cache = await caches.open(shells);
  try {
    const response = await within(fetch(request), patience);
    if (response.ok && !response.redirected) await cache.put(new URL(request.url).pathname, response.clone());
    return response;
  } catch (error) {
    const kept = await cache.match(new URL(request.url).pathname);
    if (kept) return kept;
    throw error;
  }
}

// Files of a build carry their digest in the name: what is kept stays right.
async function file(request) {
  const cache = await caches.open(files);
  const kept = await cache.match(request);
  if (kept) return kept;
  const response = await fetch(request);
  if (response.ok) await cache.put(request, response.clone());
  return response;
}

self.addEventListener('fetch', (event) => {
  const { request } = event;
  const url = new URL(request.url);
  if (request.method !== 'GET' || url.origin !== self.location.origin) return;
  if (request.mode === 'navigate' && url.pathname.startsWith('/sit/')) event.respondWith(shell(request));
  else if (url.pathname.startsWith('/_next/static/')) event.respondWith(file(request));
});

// What the page loaded before this worker had it is fetched once more, so that the first reload already works.
self.addEventListener('message', (event) => {
  if (event.data?.kind !== 'keep' || !Array.isArray(event.data.urls)) return;
  event.waitUntil(
    Promise.all(
      event.data.urls.map(async (address) => {
        const url = new URL(address, self.location.origin);
        if (url.origin !== self.location.origin) return;
        if (url.pathname.startsWith('/_next/static/')) await file(new Request(url)).catch(() => undefined);
        else if (url.pathname.startsWith('/sit/')) await shell(new Request(url)).catch(() => undefined);
      }),
    ),
  );
});
