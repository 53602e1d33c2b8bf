/* Keeps the clock's page on the tablet, so that it opens without a link. Times themselves are kept by the page. */
const CACHE = "valvekeeper-clock-1";
const PAGE = "/clock";

const isFile = (url) => url.origin === self.location.origin && (url.pathname.startsWith("/_next/static/") || /\.(woff2|svg|png|ico)$/.test(url.pathname));

self.addEventListener("install", (event) => {
  event.waitUntil(caches.open(CACHE).then((cache) => cache.add(new Request(PAGE, { cache: "reload" }))).then(() => self.skipWaiting()));
});
self.addEventListener("activate", (event) => {
  event.waitUntil(caches.keys().then((names) => Promise.all(names.filter((n) => n !== CACHE).map((n) => caches.delete(n)))).then(() => self.clients.claim()));
});

// The page says which files it was drawn with: those are kept, older ones go.
self.addEventListener("message", (event) => {
  const files = event.data && Array.isArray(event.data.files) ? event.data.files.map((f) => new URL(f, self.location.origin)).filter(isFile) : [];
  if (files.length === 0) return;
  event.waitUntil(caches.open(CACHE).then(async (cache) => {
    const wanted = new Set(files.map((f) => f.href));
    for (const request of await cache.keys()) if (isFile(new URL(request.url)) && !wanted.has(request.url)) await cache.delete(request);
    await Promise.all([...wanted].map(async (href) => { if (!(await cache.match(href))) await cache.add(href).catch(() => undefined); }));
  }));
});

self.addEventListener("fetch", (event) => {
  const { request } = event;
  const url = new URL(request.url);
  if (request.method !== "GET" || url.origin !== self.location.origin) return;
  if (request.mode === "navigate" && url.pathname === PAGE) event.respondWith(page(request));
  else if (isFile(url)) event.respondWith(fetch(request).catch(() => caches.match(request).then((kept) => kept || Response.error())));
});

// The page as it is now; without a link or an answer within four seconds, as it was last.
async function page(request) {
  const cache = await caches.open(CACHE);
  const fresh = fetch(request).then(async (response) => {
    if (response.ok && !response.redirected) await cache.put(PAGE, response.clone());
    return response;
  });
  const late = new Promise((resolve) => setTimeout(() => resolve(null), 4000));
  const first = await Promise.race([fresh.catch(() => null), late]);
  if (first && first.ok) return first;
  return (await cache.match(PAGE)) || fresh;
}
