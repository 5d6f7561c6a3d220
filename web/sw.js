/**
 * The service worker: keeps one verified copy of every file of the page, so that it opens without a network.
 *
 * The build fills in the three values below. A version is used only when every file of it is there with the
 * SHA-256 that the build wrote down; it takes over only when the page says so; the version before it is
 * deleted only after the new one has started Python once.
 *
 * In:  {type: "check"} · {type: "take-over"} · {type: "started"} · {type: "changes"}
 * Out: {type: "changes", changes} · {type: "offline", phase: "fetching"|"ready"|"failed", version, done, of, message}
 */
const VERSION = "@VERSION@";
const POLICY = "@POLICY@";
/** @type {{path: string, size: number, sha256: string, type: string}[]} */
const ASSETS = /* @ASSETS@ */ [];

const SCOPE = new URL("./", self.location.href);
const PREFIX = `gasbasis ${SCOPE.pathname} `;
const CURRENT = PREFIX + VERSION;
const BY_PATH = new Map(ASSETS.map((asset) => [asset.path, asset]));

self.addEventListener("install", (event) => event.waitUntil(keepAll()));
self.addEventListener("activate", (event) => event.waitUntil(self.clients.claim()));

self.addEventListener("message", (event) => {
  if (event.data.type === "take-over") self.skipWaiting();
  if (event.data.type === "started") event.waitUntil(deleteOlder());
  if (event.data.type === "changes") event.waitUntil(tellChanges(event.source));
  if (event.data.type === "check") event.waitUntil(keepAll().catch(() => {}));
});

self.addEventListener("fetch", (event) => {
  const address = new URL(event.request.url);
  if (address.origin !== SCOPE.origin) {
    event.respondWith(Response.error());
    return;
  }
  if (event.request.method !== "GET") return;
  const asset = BY_PATH.get(pathOf(address));
  if (asset) event.respondWith(answer(asset, event.request));
});

/** The path below the scope; the scope itself is the page. @param {URL} address */
function pathOf(address) {
  if (!address.pathname.startsWith(SCOPE.pathname)) return "";
  return decodeURIComponent(address.pathname.slice(SCOPE.pathname.length)) || "index.html";
}

/** @param {{path: string}} asset */
const keyOf = (asset) => new URL(asset.path, SCOPE).href;

/**
 * From the copy of this version only. A file that the browser has dropped is fetched again and verified; when the
 * host has only a newer one, that is better than no page: the update will make the version whole.
 */
async function answer(asset, request) {
  const kept = await (await caches.open(CURRENT)).match(keyOf(asset));
  return kept ?? fetchVerified(asset).catch(() => fetch(request));
}

/** Keep and verify every file. Reports as it goes; throws, and says why, when one cannot be had. */
async function keepAll() {
  const cache = await caches.open(CURRENT);
  let done = 0;
  try {
    for (const asset of ASSETS) {
      await keep(cache, asset);
      done += 1;
      await tell({ phase: "fetching", done });
    }
    await tell({ phase: "ready", done });
  } catch (error) {
    await tell({ phase: "failed", done, message: String(error.message ?? error) });
    throw error;
  }
}

/** Files that are there already, in this or an older version, are verified and not fetched again. */
async function keep(cache, asset) {
  if (await verified(await cache.match(keyOf(asset)), asset)) return;
  const older = await fromOlder(asset);
  await cache.put(keyOf(asset), older ?? await fetchVerified(asset));
}

async function fromOlder(asset) {
  for (const name of await ownCaches()) {
    const bytes = await verified(await (await caches.open(name)).match(keyOf(asset)), asset);
    if (bytes) return responseOf(bytes, asset);
  }
  return null;
}

async function fetchVerified(asset) {
  const response = await fetch(keyOf(asset), { cache: "no-cache" }).catch(() => {
    throw new Error(`${asset.path} is missing from the copy and could not be fetched: no network, or no answer from the host`);
  });
  if (!response.ok) throw new Error(`${asset.path} could not be fetched (${response.status})`);
  const bytes = await verified(response, asset);
  if (!bytes) throw new Error(`${asset.path} is not the file that belongs to version ${VERSION}`);
  return responseOf(bytes, asset);
}

/** The bytes of a response if they are those that the build wrote down, else null. */
async function verified(response, asset) {
  if (!response) return null;
  const bytes = await response.arrayBuffer();
  if (bytes.byteLength !== asset.size) return null;
  const digest = new Uint8Array(await crypto.subtle.digest("SHA-256", bytes));
  const text = Array.from(digest, (byte) => byte.toString(16).padStart(2, "0")).join("");
  return text === asset.sha256 ? bytes : null;
}

/** With the right media type and policy, whatever the host sends. */
function responseOf(bytes, asset) {
  return new Response(bytes, {
    headers: { "Content-Type": asset.type, "Content-Length": String(asset.size), "Content-Security-Policy": POLICY },
  });
}

const ownCaches = async () => (await caches.keys()).filter((name) => name.startsWith(PREFIX));

/** Only our own, only of this scope, and never one that is just being filled by a newer version. */
async function deleteOlder() {
  if (self.registration.installing || self.registration.waiting) return;
  for (const name of await ownCaches()) {
    if (name !== CURRENT) await caches.delete(name);
  }
}

/** What this version changes, out of its own copy: a page of an older version asks before it is replaced. */
async function tellChanges(page) {
  const kept = await (await caches.open(CURRENT)).match(keyOf({ path: "changes.json" }));
  page.postMessage({ type: "changes", changes: kept ? await kept.json() : [] });
}

async function tell(news) {
  const pages = await self.clients.matchAll({ type: "window", includeUncontrolled: true });
  for (const page of pages) {
    if (page.url.startsWith(SCOPE.href)) page.postMessage({ type: "offline", version: VERSION, of: ASSETS.length, message: "", ...news });
  }
}
