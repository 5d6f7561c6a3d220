/** The one-file edition is its own copy: there is nothing to keep, nothing to check and no newer version to ask about. */
export function startOffline({ onState = () => {} } = {}) {
  const state = { phase: "ready", version: "", done: 1, of: 1, checkedAt: "", message: "One file: everything is in it, and it needs no network.", update: false, changes: [], persistent: null };
  onState(state);
  return { takeUpdate() {}, later() {}, check() {}, booted() {}, state };
}
