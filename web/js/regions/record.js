/** The record: who, notes, why it is amended; then the paper itself, to print, save or send. */
import { copyOver, handOverFile } from "../hand-over.js";
import { keptBy } from "../keeping.js";
import { part, say } from "../page.js";
import { drawPaper } from "./paper.js";

/** @param {HTMLElement} root @param {(intention: object) => void} dispatch */
export function mountRecord(root, dispatch) {
  const form = root.querySelector("form"), by = part(root, "by"), notes = part(root, "notes"), why = part(root, "why"), paper = part(root, "paper"), told = part(root, "told");
  const act = (name, what) => root.querySelector(`[data-action="${name}"]`).addEventListener("click", what);
  const tell = async (doing) => say(told, await doing);
  let shown = null, files = null, amending = null;
  by.value = keptBy();
  root.querySelector('[data-action="print-record"]').hidden = !("print" in globalThis);      // some browsers inside other apps cannot
  form.addEventListener("submit", (event) => { event.preventDefault(); dispatch({ type: "record", by: by.value, notes: notes.value, why: why.value }); });
  act("print-record", () => print());
  act("save-record", () => tell(handOverFile(files.json, `${files.name}.json`, "application/json")));
  act("save-text", () => tell(handOverFile(files.text, `${files.name}.txt`, "text/plain")));
  act("copy-text", () => tell(copyOver(files.text, "Copied as plain text.")));
  act("amend", () => dispatch({ type: "amend" }));
  act("leave-amending", () => dispatch({ type: "leave-amending" }));

  return (state) => {
    if (state.amends !== amending) {
      amending = state.amends;
      if (amending) notes.value = amending.notes;
      why.value = "";
      say(part(root, "amended"), amending ? `Amends the record ${amending.checksum.slice(0, 19)}…` : "");
    }
    part(root, "amend-box").hidden = !amending;
    why.required = Boolean(amending);
    if (state.record === shown) { part(root, "stale").hidden = !shown?.record || shown.sheet === state.sheet; return; }
    shown = state.record;
    const problem = shown?.problem, made = shown?.record;
    part(root, "problem").hidden = !problem;
    say(part(root, "problem"), problem ? `${problem.message} ${problem.hint}` : "");
    part(root, "made").hidden = !made;
    part(root, "stale").hidden = true;
    say(told, "");
    paper.replaceChildren();
    if (!made) return;
    // Ready before the tap that hands them over: a phone's share sheet opens only at once.
    files = { json: JSON.stringify(made, null, 1), text: shown.plain_text, name: `record-${made.made_at.slice(0, 10)}-${made.checksum.slice(7, 15)}` };
    drawPaper(paper, made, shown.working);
    part(root, "made").scrollIntoView({ block: "nearest" });
  };
}
