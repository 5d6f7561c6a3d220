/** One quiet line on the core and on being ready offline, a bar while it starts; a notice when something is asked or wrong. */
import { button, part, say } from "../page.js";

/** @param {HTMLElement} line @param {HTMLElement} bar @param {HTMLElement} notice @param {HTMLElement} more @param {(intention: object) => void} dispatch */
export function mountStatus(line, bar, notice, more, dispatch) {
  let shown = "";
  return (state) => {
    const { phase, done, of } = state.core;
    say(part(line, "core"), coreWords(state.core));
    say(part(line, "offline"), offlineWords(state.offline));
    say(part(more, "offline-detail"), detail(state.offline));
    bar.hidden = phase !== "loading";
    if (of > 1) bar.setAttribute("value", String(done / of));
    else bar.removeAttribute("value");
    const { message, actions } = noticeWords(state);
    notice.hidden = !message;
    if (message === shown) return;
    shown = message;
    say(part(notice, "message"), message);
    part(notice, "actions").replaceChildren(...actions.map(([label, intention]) => button(label, () => dispatch(intention))));
  };
}

function coreWords({ phase, stage, done, of, version }) {
  if (phase === "ready") return `version ${version}`;
  if (phase === "failed") return "not started";
  return of > 1 && stage !== "importing" ? `starting, ${Math.round(100 * done / of)} % loaded` : "starting";
}

function offlineWords(offline) {
  if (offline?.phase === "ready") return "· ready offline";
  if (offline?.phase === "fetching" && offline.of) return `· keeping for offline ${offline.done} of ${offline.of}`;
  return "";
}

function detail(offline) {
  if (!offline) return "";
  const when = offline.checkedAt ? `, checked ${new Date(offline.checkedAt).toLocaleString()}` : "";
  const promise = offline.persistent === null ? "" : offline.persistent ? " The browser promised not to clear them." : " The browser may clear them when space is short: installing the page helps.";
  if (offline.phase === "ready" && !offline.message) return `Ready offline, version ${offline.version}: ${offline.done} of ${offline.of} files kept and verified${when}.${promise}`;
  return offline.message;
}

/** What the waiting version changes that this one does not know: whether numbers do stands first. */
function news(changes, version) {
  const index = changes.findIndex((entry) => entry.version === version);
  return changes.slice(0, index < 0 ? 1 : index).map((entry) => `${entry.version}: ${entry.numbers}; ${entry.text}. `).join("");
}

function noticeWords({ core, offline, notice }) {
  if (core.phase === "failed") return { message: `The core could not start. ${core.message} What you typed is kept.`, actions: [["Try again", { type: "restart" }]] };
  if (notice) return { message: notice, actions: [["Close", { type: "notice", text: "" }]] };
  if (offline?.update) return { message: `A newer version is ready. ${news(offline.changes, core.version)}Your inputs stay.`, actions: [["Change to it", { type: "update" }], ["Later", { type: "later" }]] };
  return { message: "", actions: [] };
}
