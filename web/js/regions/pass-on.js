/** Passing the sheet on: its link to share, copy or scan, and as a file where the link would be too long. */
import { canShare, copyOver, handOverBySharing, handOverFile } from "../hand-over.js";
import { linkOf } from "../link.js";
import { part, say } from "../page.js";
import { qrCode } from "./qr.js";

/** @param {HTMLElement} root @param {(intention: object) => void} dispatch */
export function mountPassOn(root, dispatch) {
  const act = (name) => root.querySelector(`[data-action="${name}"]`), told = part(root, "told"), names = part(root, "names"), field = part(root, "link");
  let passed = null, link = "";
  const tell = async (doing) => say(told, await doing);
  act("share").addEventListener("click", () => tell(handOverBySharing({ url: link.startsWith("http") ? link : undefined, text: link.startsWith("http") ? undefined : link })));
  act("copy-link").addEventListener("click", () => tell(copyOver(link, "Copied.")));
  act("save-sheet").addEventListener("click", () => tell(handOverFile(passed.file, "sheet.gasbasis.json", "application/json")));
  names.addEventListener("change", () => dispatch({ type: "link", withNames: names.checked }));
  field.addEventListener("focus", () => field.select());

  return (state) => {
    if (root.hidden) return;
    names.closest("label").hidden = !state.sheet.title && !Object.values(state.sheet.notes).some(Boolean);
    const stale = state.answer && state.answeredFor === state.sheet && (state.passed?.sheet !== state.sheet || state.passed?.answer !== state.answer);
    if (stale) queueMicrotask(() => dispatch({ type: "link", withNames: names.checked }));
    if (state.passed === passed) return;
    passed = state.passed;
    if (!passed) return;
    say(told, "");
    say(part(root, "problem"), passed.problem);
    part(root, "problem").hidden = !passed.problem;
    for (const node of root.querySelectorAll("[data-when='link']")) node.hidden = Boolean(passed.problem);
    if (passed.problem) { part(root, "qr").replaceChildren(); return; }
    link = linkOf(passed.code);
    field.value = link;
    act("share").hidden = !canShare();
    const drawn = qrCode(link);
    part(root, "qr").replaceChildren(...(drawn ? [drawn] : []));
    say(part(root, "no-qr"), drawn ? "" : "It holds too much for a QR code that a phone could read off this screen.");
    say(part(root, "size"), `${link.length} characters`);
  };
}
