/** A word about what was just done, with what can undo it; it stays until closed or until the next. */
import { button, part, say } from "../page.js";

/** @param {HTMLElement} root @param {(intention: any) => void} dispatch */
export function mountAside(root, dispatch) {
  let shown = null;
  return ({ aside }) => {
    if (aside === shown) return;
    shown = aside;
    root.classList.toggle("hidden", !aside);        // out of sight, not out of the tree: what is said here later is read out
    say(part(root, "message"), aside?.text ?? "");
    part(root, "actions").replaceChildren(...(aside ? [...aside.actions, ["Close", { type: "aside" }]] : []).map(([label, intention]) =>
      button(label, () => { dispatch({ type: "aside" }); dispatch(intention); }, "bare")));
  };
}
