/** The box for a link, a code or a file; of a record, what its checksum and a recomputation say. */
import { part, say } from "../page.js";
import { mountPasteBox } from "./paste-box.js";

/** @param {HTMLElement} root @param {(intention: object) => void} dispatch */
export function mountReceive(root, dispatch) {
  const box = mountPasteBox(root, (text) => dispatch({ type: "receive", text })), result = part(root, "result");
  root.querySelector('[data-action="amend"]').addEventListener("click", () => dispatch({ type: "amend" }));
  root.querySelector('[data-action="to-sheet"]').addEventListener("click", () => dispatch({ type: "panel", name: "" }));
  let shown = null;
  return ({ received }) => {
    if (received === shown) return;
    shown = received;
    if (received?.problem) box.show(received.problem);
    else box.clear();
    result.hidden = !received?.record;
    if (result.hidden) return;
    const { record, checksum_holds, same, sentence } = received.record;
    result.dataset.state = checksum_holds && same ? "good" : "bad";
    say(part(root, "sentence"), sentence);
    say(part(root, "made"), [`Made ${record.made_at}`, record.made_by && `by ${record.made_by}`, record.app && `with version ${record.app.version}`].filter(Boolean).join(" "));
  };
}
