// The offline copy. The build fills in the version and the list of files, each with its SHA-256.
// One version, one cache: a version is served only when every file of it has arrived whole.

const VERSION = "@VERSION@";
const FILES = new Map(/*@FILES@*/[]);
const PREFIX = `lowside ${self.registration.scope} `;
const CACHE = PREFIX + VERSION;
const PAGE = "index.html";

const address = (file) => new URL(file, self.registration.scope).href;

async function sha256(bytes) {
  const digest = new Uint8Array(await crypto.subtle.digest("SHA-256", bytes));
  return Array.from(digest, (byte) => byte.toString(16).padStart(2, "0")).join("");
}

/** The response's content if it is what the build emitted; a log-in page of some guest network is not. */
async function verified(response, hash) {
  if (!response?.ok) return null;
  const bytes = await response.arrayBuffer();
  if ((await sha256(bytes)) !== hash) return null;
  // Built anew: a redirected or compressed original would not do for a later navigation.
  return new Response(bytes, { headers: { "Content-Type": response.headers.get("Content-Type") ?? "" } });
}

/** A file that did not change is taken from the copy at hand: a mobile connection costs money. */
async function obtain(file, hash) {
  const kept = await verified(await caches.match(address(file)), hash);
  if (kept) return kept;
  const fresh = await verified(await fetch(address(file), { cache: "no-cache" }), hash);
  if (!fresh) throw new Error(`${file} did not arrive as it was built`);
  return fresh;
}

async function install() {
  // All files first, then the cache: a download that breaks off leaves nothing behind, and the old version serves on.
  const obtained = await Promise.all([...FILES].map(async ([file, hash]) => [address(file), await obtain(file, hash)]));
  const cache = await caches.open(CACHE);
  await Promise.all(obtained.map(([url, response]) => cache.put(url, response)));
}

async function activate() {
  const names = await caches.keys();
  const old = names.filter((name) => name.startsWith(PREFIX) && name !== CACHE);
  await Promise.all(old.map((name) => caches.delete(name)));
  await self.clients.claim();
}

/** The file that a request asks for: without its query (worker.js gets one); the folder itself is the page. */
function fileOf(request) {
  const { origin, pathname } = new URL(request.url);
  const file = (origin + pathname).slice(self.registration.scope.length);
  return file === "" ? PAGE : file;
}

async function fromCopy(file, request) {
  const kept = await caches.open(CACHE).then((cache) => cache.match(address(file))).catch(() => null);
  return kept ?? fetch(request);
}

/** An address below the app that is none of its files: the server knows best; without it, the app's own page. */
function elsewhere(request) {
  return fetch(request).catch(() => Response.redirect(self.registration.scope));
}

self.addEventListener("install", (event) => event.waitUntil(install()));
self.addEventListener("activate", (event) => event.waitUntil(activate()));
self.addEventListener("message", (event) => {
  if (event.data === "skip-waiting") self.skipWaiting();
});
self.addEventListener("fetch", (event) => {
  const { request } = event;
  if (request.method !== "GET" || !request.url.startsWith(self.registration.scope)) return;
  const file = fileOf(request);
  if (FILES.has(file)) event.respondWith(fromCopy(file, request));
  else if (request.mode === "navigate") event.respondWith(elsewhere(request));
});
