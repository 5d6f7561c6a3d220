/**
 * Registers the service worker, tells the page when it is ready offline, and asks before an update.
 *
 * @typedef {{phase: "unsupported"|"fetching"|"ready"|"failed", version: string, done: number, of: number,
 *            checkedAt: string, message: string, update: boolean, changes: object[], persistent: boolean | null}} OfflineState
 *   `persistent`: whether the browser promised not to clear the copy when space is short; null when it does not say.
 *   `changes`: what the waiting version changes, newest first.
 *   `update`: a newer version is kept and verified, and waits for the person's yes.
 */

/**
 * Call it when the core is ready, so that fetching for later does not slow the first figure, or when it cannot start, to mend
 * a damaged copy. `booted` tells that this version has started Python: only then may the version before it go.
 *
 * @param {{onState?: (state: OfflineState) => void, beforeReload?: () => void | Promise<void>}} options
 * @returns {{state: OfflineState, takeUpdate: () => void, later: () => void, check: () => void, booted: () => void}}
 */
export function startOffline({ onState = () => {}, beforeReload = () => {} } = {}) {
  /** @type {OfflineState} */
  let state = { phase: "fetching", version: "", done: 0, of: 0, checkedAt: "", message: "", update: false, changes: [], persistent: null };
  /** @type {ServiceWorkerRegistration | null} */
  let registration = null;
  let reloading = false, started = false, postponed = false;

  function change(patch) {
    state = { ...state, ...patch };
    onState(state);
  }

  function onNews({ data, source }) {
    if (data?.type === "changes") change({ changes: data.changes });
    if (data?.type !== "offline") return;
    if (registration && source !== registration.active && registration.active) return;   // a newer version being fetched
    const checkedAt = data.phase === "ready" ? new Date().toISOString() : state.checkedAt;
    change({ phase: data.phase, version: data.version, done: data.done, of: data.of, message: data.message, checkedAt });
  }

  /** A worker that waits is asked about, also when it was left waiting by an earlier visit. */
  function watchForUpdate() {
    const look = () => {
      const update = Boolean(registration.waiting && registration.active) && !postponed;
      if (update) registration.waiting.postMessage({ type: "changes" });
      change({ update });
    };
    look();
    registration.addEventListener("updatefound", () => {
      registration.installing?.addEventListener("statechange", look);
    });
  }

  function takeUpdate() {
    if (!registration?.waiting) return;
    reloading = true;
    registration.waiting.postMessage({ type: "take-over" });
  }

  function check() {
    registration?.active?.postMessage({ type: "check" });
  }

  /** Not now: asked again at the next start. */
  function later() {
    postponed = true;
    change({ update: false });
  }

  function booted() {
    started = true;
    registration?.active?.postMessage({ type: "started" });
  }

  async function onNewController() {
    if (!reloading) return;
    await beforeReload();
    location.reload();
  }

  async function start() {
    if (!("serviceWorker" in navigator)) {
      change({ phase: "unsupported", message: "This browser keeps no copy of the page for use without a network." });
      return;
    }
    navigator.serviceWorker.addEventListener("message", onNews);
    navigator.serviceWorker.addEventListener("controllerchange", onNewController);
    try {
      registration = await navigator.serviceWorker.register(new URL("../sw.js", import.meta.url), { updateViaCache: "none" });
    } catch (error) {
      change({ phase: "failed", message: `The page could not be kept for use without a network: ${error.message ?? error}` });
      return;
    }
    if (!registration) return;         // service workers are blocked: nothing is kept, nothing is promised
    watchForUpdate();
    change({ persistent: await navigator.storage?.persist?.().catch(() => null) ?? null });
    if (started) booted();
    check();
  }

  start();
  return { takeUpdate, later, check, booted, get state() { return state; } };
}
