'use strict';
// The service worker of the hosted page. pagebuild puts VERSION, BUNDLE and FILES before it. A bundle is all files of one
// version, in a cache of its own: filled whole, with every file checked, or not at all. The worker may be replaced at any
// time; the bundle that it serves is the one that was chosen, and another is chosen only when the page asks for it.
const PREFIX = 'levelspan ' + self.registration.scope + ' ', CACHE = PREFIX + BUNDLE, CHOICE = PREFIX + 'choice', KEY = './choice';

let known = null;                                       // the name of the chosen cache, once read
const chosen = async () => {
  if (known) return known;
  const noted = await caches.match(KEY, {cacheName: CHOICE}), name = noted ? await noted.text() : '';
  return known = name && await caches.has(name) ? name : CACHE;
};
const choose = async name => {
  await (await caches.open(CHOICE)).put(KEY, new Response(name));
  known = name;
};
const sweep = async keep => {
  for (const name of await caches.keys()) if (name.startsWith(PREFIX) && name !== CHOICE && !keep.includes(name)) await caches.delete(name);
};

// A network that answers every address with a page of its own, or a server between two versions, fails the check here.
const fill = async () => (await caches.open(CACHE)).addAll(FILES.map(([name, integrity]) =>
  new Request(name, {integrity, cache: /-[0-9a-f]{12}\.[a-z]+$/.test(name) ? 'default' : 'reload'})));

self.addEventListener('install', e => e.waitUntil(fill().then(() => self.skipWaiting())));

self.addEventListener('activate', e => e.waitUntil((async () => {
  await choose(await chosen());
  await sweep([known, CACHE]);
  await self.clients.claim();
})()));

// "which" asks what is ready, and whether it is what is served; "take" serves it from now on.
self.addEventListener('message', e => e.waitUntil((async () => {
  if (e.data === 'take') {
    await choose(CACHE);
    await sweep([CACHE]);
  }
  e.ports[0].postMessage({version: VERSION, taken: await chosen() === CACHE});
})()));

self.addEventListener('fetch', e => {
  const r = e.request, url = new URL(r.url), home = new URL('./', self.location);
  if (r.method !== 'GET' || url.origin !== home.origin || !url.pathname.startsWith(home.pathname)) return;
  const page = r.mode === 'navigate' && (url.pathname === home.pathname || url.pathname === home.pathname + 'index.html');
  const kept = async () => caches.match(page ? './' : r, {cacheName: await chosen(), ignoreSearch: true, ignoreVary: true});
  e.respondWith(kept().catch(() => null).then(found => found || fetch(r)));
});
