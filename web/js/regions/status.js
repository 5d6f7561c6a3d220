/** One quiet line on the core and on being ready offline; a notice when something is asked or wrong. */
import { button, part, say } from "../page.js";

/** @param {HTMLElement} line @param {HTMLElement} notice @param {(intention: object) => void} dispatch */
export function mountStatus(line, notice, dispatch) {
  let shown = "";
  return (state) => {
    say(part(line, "core"), coreWords(state.core));
    say(part(line, "offline"), offlineWords(state.offline));
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
  const share = of > 1 ? ` ${Math.round(100 * done / of)} %` : "";
  return stage === "importing" ? "starting" : `loading${share}`;
}

function offlineWords(offline) {
  if (!offline) return "";
  if (offline.phase === "ready") return "· ready offline";
  if (offline.phase === "fetching") return offline.of ? `· keeping for offline ${offline.done} of ${offline.of}` : "";
  return "";
}

function noticeWords({ core, offline, notice }) {
  if (core.phase === "failed") return { message: `The core could not start. ${core.message} What you typed is kept.`, actions: [["Try again", { type: "restart" }]] };
  if (notice) return { message: notice, actions: [["Close", { type: "notice", text: "" }]] };
  if (offline?.update) return { message: "A newer version is ready. Your inputs stay.", actions: [["Change to it", { type: "update" }], ["Later", { type: "later" }]] };
  return { message: "", actions: [] };
}
